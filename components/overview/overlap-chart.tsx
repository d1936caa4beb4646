import { ChartFigure } from '@/components/charts/chart-figure';
import { useWidth } from '@/components/charts/use-width';
import type { SurveyList } from '@/lib/schemas/surveys';

const ROW = 21;
const BARS = 84;
const MOST_SETS = 12;

/** Stars by the set of surveys that list them: a column a set, filled dots for its surveys. */
export function OverlapChart({ list }: { list: SurveyList }) {
  const [measure, width] = useWidth<HTMLDivElement>(380);
  const sets = list.overlaps.slice(0, MOST_SETS);
  const others = list.overlaps.slice(MOST_SETS);
  const starsOfOthers = others.reduce((sum, { stars }) => sum + stars, 0);
  const surveys = list.surveys.filter((survey) => !survey.isArchived);
  const left = 88;
  const step = Math.min(32, (width - left - 12) / Math.max(1, sets.length));
  const most = Math.max(1, ...sets.map((set) => set.stars));
  const x = (i: number) => left + step * (i + 0.5);
  const y = (row: number) => BARS + 34 + ROW * row;
  const height = y(surveys.length - 1) + 16;
  const rowOf = (slug: string) => surveys.findIndex((survey) => survey.slug === slug);
  const nameOf = (slug: string) => surveys.find((survey) => survey.slug === slug)?.name ?? slug;
  return (
    <>
      <ChartFigure
        name="overlaps"
        label={`Stars by set of surveys: ${sets.map((set) => `${set.stars} in ${set.surveys.map(nameOf).join(' and ')}`).join(', ')}`}
        width={width}
        height={height}
        measure={measure}
        tables={() => [
          {
            caption: 'Stars by the surveys that list them',
            columns: ['surveys', 'stars'],
            rows: list.overlaps.map((set) => [
              set.surveys.map(nameOf).join(', '),
              String(set.stars),
            ]),
          },
        ]}
      >
        {sets.map((set, i) => {
          const size = (BARS * set.stars) / most;
          const rows = set.surveys.map(rowOf).filter((row) => row >= 0);
          const isShared = rows.length > 1;
          return (
            <g key={set.surveys.join('+')}>
              <rect
                x={x(i) - step * 0.3}
                width={step * 0.6}
                y={BARS + 16 - size}
                height={size}
                fill={isShared ? 'var(--ink)' : 'var(--data-soft)'}
              />
              <text x={x(i)} y={BARS + 11 - size} textAnchor="middle">
                {set.stars}
              </text>
              {isShared && (
                <line
                  x1={x(i)}
                  x2={x(i)}
                  y1={y(Math.min(...rows))}
                  y2={y(Math.max(...rows))}
                  stroke="var(--ink)"
                  strokeWidth="2"
                />
              )}
              {surveys.map((survey, row) => (
                <circle
                  key={survey.slug}
                  cx={x(i)}
                  cy={y(row)}
                  r="5"
                  fill={rows.includes(row) ? 'var(--ink)' : 'var(--page)'}
                  stroke={rows.includes(row) ? 'none' : 'var(--rule)'}
                  strokeWidth="1.4"
                />
              ))}
            </g>
          );
        })}
        {surveys.map((survey, row) => (
          <text key={survey.slug} x="0" y={y(row) + 4}>
            {survey.name}
          </text>
        ))}
      </ChartFigure>
      {others.length > 0 && (
        <p className="text-chart text-ink3">
          Not drawn: {others.length} {others.length === 1 ? 'set' : 'sets'} of surveys with{' '}
          {starsOfOthers} {starsOfOthers === 1 ? 'star' : 'stars'}; in the table.
        </p>
      )}
    </>
  );
}
