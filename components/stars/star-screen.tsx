'use client';

import { useMemo } from 'react';
import { CompletenessMapChart } from '@/components/charts/completeness-map-chart';
import { MassLimitChart } from '@/components/charts/mass-limit-chart';
import { RampKey } from '@/components/charts/ramp-key';
import { type StarCurve, StarCurvesChart } from '@/components/charts/star-curves-chart';
import { decidePair, useStar } from '@/components/hooks/use-stars';
import { useMap } from '@/components/hooks/use-surveys';
import { RangesWords } from '@/components/surveys/yardstick-words';
import { Link } from '@/components/ui/link';
import { JupiterMass } from '@/components/ui/notation';
import { PageTitle } from '@/components/ui/page-title';
import { SectionOpener } from '@/components/ui/section-opener';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { formatPlain } from '@/lib/quantities/display';
import type { StarPage } from '@/lib/schemas/stars';
import { PairCard } from './pair-card';
import { StarEntries } from './star-entries';
import { ValueChoice } from './value-choice';

function StoredMap({
  collaboration,
  mapId,
  title,
  subject,
  otherwise,
}: {
  collaboration: string;
  mapId: string | null;
  title: string;
  subject: string;
  /** Why there is none. */
  otherwise: string;
}) {
  const { data } = useMap(collaboration, mapId);
  const map = useMemo(
    () =>
      data && {
        massMjup: Float64Array.from(data.massMjup),
        semiMajorAxisAu: Float64Array.from(data.semiMajorAxisAu),
        completeness: Float64Array.from(data.completeness.flat()),
      },
    [data],
  );
  return (
    <div className="min-w-0">
      <h3 className="mb-1 font-semibold">{title}</h3>
      {map ? (
        <>
          <CompletenessMapChart map={map} subject={subject} detections={[]} />
          <MassLimitChart map={map} subject={subject} />
        </>
      ) : (
        <p className="py-2 text-ink3 text-note">{otherwise}</p>
      )}
    </div>
  );
}

const rules: Record<string, string> = {
  'same-position': 'place by place',
  deepest: 'the deepest survey counts',
  independent: 'as independent observations',
};

/** One map a survey, and the one that runs use where several surveys list the star. */
function Maps({ collaboration, star }: { collaboration: string; star: StarPage }) {
  const { combined, entries } = star;
  return (
    <>
      <SectionOpener
        title="Completeness maps"
        help="completeness-map"
        context={entries.length > 1 ? 'one a survey, and the combined one' : undefined}
      />
      <div className="grid gap-x-10 gap-y-6 md:grid-cols-2 xl:grid-cols-3">
        {entries.map((entry) => (
          <StoredMap
            key={entry.targetId}
            collaboration={collaboration}
            mapId={entry.mapId}
            title={entry.survey.name}
            subject={`detection probability of ${entry.name} in ${entry.survey.name}`}
            otherwise={
              entry.mapFault ??
              (entry.mapState === 'waiting' ? 'The map is on its way.' : 'No map.')
            }
          />
        ))}
        {entries.length > 1 && (
          <div className="min-w-0">
            <StoredMap
              collaboration={collaboration}
              mapId={combined?.mapId ?? null}
              title="Combined"
              subject={`detection probability of ${star.name} in all its surveys`}
              otherwise={
                combined
                  ? 'The map is on its way.'
                  : 'No run has combined the surveys of this star yet.'
              }
            />
            {combined && (
              <p className="text-ink3 text-note">
                {combined.surveys.join(' and ')}, {rules[combined.rule] ?? combined.rule}; as{' '}
                <Link href={`/${collaboration}/analyses/${combined.key}`}>{combined.key}</Link>, run{' '}
                {combined.run} used it
              </p>
            )}
          </div>
        )}
      </div>
      <RampKey label="detection probability" />
    </>
  );
}

function Analyses({ collaboration, star }: { collaboration: string; star: StarPage }) {
  if (star.analyses.length === 0) return <p className="py-2 text-ink3">No run counts it yet.</p>;
  return (
    <Table caption={`Analyses that count ${star.name}`}>
      <TableHead>
        <tr>
          <HeadCell>analysis</HeadCell>
          <HeadCell isNumeric>newest run with it</HeadCell>
          <HeadCell>averaged over</HeadCell>
          <HeadCell isNumeric>detection probability</HeadCell>
          <HeadCell isNumeric>of the sum</HeadCell>
        </tr>
      </TableHead>
      <TableBody>
        {star.analyses.map((one) => (
          <Row key={one.key}>
            <Cell isRowHead>
              <Link href={`/${collaboration}/analyses/${one.key}`}>
                {one.key} {one.name}
              </Link>
            </Cell>
            <Cell isNumeric>{one.run}</Cell>
            <Cell>{one.ranges ? <RangesWords ranges={one.ranges} /> : one.population}</Cell>
            <Cell isNumeric>{`${Math.round(100 * one.probability)}\u2009%`}</Cell>
            <Cell isNumeric>{`${formatPlain(100 * one.share, 2)}\u2009%`}</Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}

/** Its curves by survey and band, and by what else tells two of one survey apart. */
function namedCurves({ curves, entries }: StarPage): StarCurve[] {
  const positionOf = new Map(entries.map(({ targetId, survey }) => [targetId, survey.position]));
  const short = curves.map(({ survey, band }) => `${survey} ${band}`);
  const isAlone = (name: string) => short.filter((other) => other === name).length === 1;
  const long = curves.map(({ epoch }, i) =>
    isAlone(short[i]) || epoch === null ? short[i] : `${short[i]} ${epoch}`,
  );
  return curves.map((curve, i) => ({
    name: long.indexOf(long[i]) === i ? long[i] : `${long[i]}, ${i + 1}`,
    seriesIndex: positionOf.get(curve.targetId) ?? -1,
    separationArcsec: Float64Array.from(curve.separationArcsec),
    contrastMag: Float64Array.from(curve.contrastMag),
  }));
}

/** One star: what every survey knows of it, and what rests on it. */
export function StarScreen({
  collaboration,
  initial,
}: {
  collaboration: string;
  initial: StarPage;
}) {
  const { data: star = initial, mutate } = useStar(collaboration, initial.id, initial);
  const replace = (next: StarPage) => void mutate(next, { revalidate: false });
  const curves = useMemo(() => namedCurves(star), [star]);
  const sigmas = new Set(star.curves.map(({ nSigma }) => nSigma));
  const names = [star.gaiaDr3Id && `Gaia DR3 ${star.gaiaDr3Id}`, ...star.otherNames];
  return (
    <>
      <PageTitle
        title={star.name}
        crumbs={[{ href: `/${collaboration}/stars`, label: 'Stars' }, { label: star.name }]}
        context={names.filter(Boolean).join(', ') || undefined}
      />
      <section className="mb-9">
        <SectionOpener
          title="Entries"
          context={
            star.entries.length === 1 ? 'one survey' : `${star.entries.length} surveys, one star`
          }
        />
        <StarEntries collaboration={collaboration} star={star} onChanged={replace} />
      </section>
      <section className="mb-9 grid gap-x-10 gap-y-6 xl:grid-cols-2">
        {(['age', 'distance'] as const).map((quantity) => (
          <ValueChoice
            key={quantity}
            collaboration={collaboration}
            star={star}
            quantity={quantity}
            canAdopt={star.can.adopt}
            onChanged={() => void mutate()}
          />
        ))}
      </section>
      {curves.length > 0 && (
        <section className="mb-9 max-w-[760px]">
          <SectionOpener
            title="Contrast curves"
            help="contrast-curve"
            context={star.curves
              .map(({ survey, band, epoch }) => [survey, band, epoch].filter(Boolean).join(' '))
              .join(', ')}
          />
          <StarCurvesChart
            curves={curves}
            nSigma={sigmas.size === 1 ? [...sigmas][0] : undefined}
          />
        </section>
      )}
      <section className="mb-9">
        <Maps collaboration={collaboration} star={star} />
      </section>
      <section className="mb-9">
        <SectionOpener title="Companions and candidates" context={`${star.companions.length}`} />
        <ul className="divide-y divide-rule">
          {star.companions.map((one) => (
            <li key={one.id} className="py-1.5">
              <Link className="font-semibold" href={`/${collaboration}/candidates/${one.id}`}>
                {one.name}
              </Link>
              , {one.status}, {one.survey}
              {one.massMjup !== null && (
                <>
                  , {formatPlain(one.massMjup, 3)}
                  {'\u00a0'}
                  <JupiterMass />
                </>
              )}
              {one.semiMajorAxisAu !== null && ` at ${formatPlain(one.semiMajorAxisAu, 3)}\u00a0AU`}
            </li>
          ))}
        </ul>
        {star.companions.length === 0 && <p className="py-2 text-ink3">None is known.</p>}
      </section>
      <section className="mb-9">
        <SectionOpener title="Analyses" context="that count this star" />
        <Analyses collaboration={collaboration} star={star} />
      </section>
      {star.matches.length > 0 && (
        <section>
          <SectionOpener title="Pairs" context="with stars that may be the same" />
          <ul>
            {star.matches.map((pair) => (
              <PairCard
                key={pair.id}
                collaboration={collaboration}
                pair={pair}
                canDecide={star.can.combine}
                onDecide={async (verdict, why) => {
                  await decidePair(collaboration, pair.id, verdict, why);
                  await mutate();
                }}
              />
            ))}
          </ul>
        </section>
      )}
    </>
  );
}
