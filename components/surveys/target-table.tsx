'use client';

import { useMemo } from 'react';
import { seriesColour } from '@/components/charts/series';
import { Sparkline } from '@/components/charts/sparkline';
import { probabilityColumn } from '@/components/stars/probability-column';
import type { DataColumn, Facet } from '@/components/ui/data-table/column';
import { DataTable } from '@/components/ui/data-table/data-table';
import { StateMark } from '@/components/ui/state-mark';
import { ErrorTerm } from '@/components/ui/table';
import type { TargetView } from '@/lib/schemas/surveys';
import type { YardstickView } from '@/lib/schemas/yardstick';
import { formatErrorPart, formatMeasured } from './measured';

/** Columns that a narrow screen leaves to the panel of the chosen star. */
const wide = 'max-md:hidden';
const wider = 'max-lg:hidden';

function MapMark({ target }: { target: TargetView }) {
  if (target.leftOutReason !== null) return <StateMark kind="stopped">left out</StateMark>;
  if (target.mapState === 'failed')
    return <StateMark kind="bad">{target.mapFault ?? 'no map'}</StateMark>;
  if (target.mapState === 'waiting') return <StateMark kind="running">map on its way</StateMark>;
  if (target.mapState === 'none') return <StateMark kind="waiting">no curve, no map</StateMark>;
  if (target.checks.length > 0) return <StateMark kind="warn">{target.checks[0]}</StateMark>;
  return (
    <StateMark kind="ok">
      <span className="sr-only">no remarks</span>
    </StateMark>
  );
}

const groupOf = ({ movingGroup }: TargetView) => movingGroup ?? 'field';
const half = (upper: number | null, middle: number | null) =>
  upper === null || middle === null ? null : upper - middle;

/** The state of a target's map as a word of the file. */
function checkWords(target: TargetView): string {
  if (target.leftOutReason !== null) return `left out: ${target.leftOutReason}`;
  if (target.mapState === 'ready') return target.checks.join('; ');
  return target.mapFault ?? target.mapState;
}

const nameColumn = (
  selectedId: string | null,
  onSelect: (id: string) => void,
): DataColumn<TargetView> => ({
  id: 'star',
  head: 'star',
  name: 'star',
  isRowHead: true,
  className: 'whitespace-nowrap',
  value: ({ name }) => name,
  cell: (target) => (
    <>
      <button
        type="button"
        className="text-left font-semibold max-md:min-h-11"
        aria-pressed={target.id === selectedId}
        onClick={(event) => {
          event.stopPropagation();
          onSelect(target.id);
        }}
      >
        {target.name}
      </button>
      <span className="block font-normal text-chart text-ink3 md:hidden">
        {[target.spectralType, groupOf(target)].filter(Boolean).join(', ')}
      </span>
    </>
  ),
});

const columnsOf = (yardstick: YardstickView): DataColumn<TargetView>[] => [
  {
    id: 'type',
    head: 'type',
    name: 'spectral type',
    className: wide,
    value: ({ spectralType }) => spectralType,
  },
  {
    id: 'distance',
    head: 'distance, pc',
    name: 'distance, pc',
    isNumeric: true,
    className: wide,
    value: ({ distancePc }) => distancePc,
    also: [{ name: 'distance error, pc', value: ({ distanceErrorPc }) => distanceErrorPc }],
    cell: ({ distancePc, distanceErrorPc }) => (
      <>
        {distancePc === null ? '–' : formatMeasured(distancePc, distanceErrorPc)}
        {distanceErrorPc !== null && <ErrorTerm>{formatErrorPart(distanceErrorPc)}</ErrorTerm>}
      </>
    ),
  },
  {
    id: 'age',
    head: 'age, Myr',
    name: 'age, Myr',
    isNumeric: true,
    className: wide,
    value: ({ ageMyr }) => ageMyr,
    also: [
      { name: 'age at 84 per cent, Myr', value: ({ ageUpperMyr }) => ageUpperMyr },
      { name: 'age at 16 per cent, Myr', value: ({ ageLowerMyr }) => ageLowerMyr },
    ],
    cell: ({ ageMyr, ageUpperMyr }) => {
      const error = half(ageUpperMyr, ageMyr);
      return (
        <>
          {ageMyr === null ? '–' : formatMeasured(ageMyr, error)}
          {ageMyr !== null && (
            <ErrorTerm>{error === null ? '?' : formatErrorPart(error)}</ErrorTerm>
          )}
        </>
      );
    },
  },
  {
    id: 'member',
    head: 'group',
    name: 'moving group',
    className: `whitespace-nowrap ${wider}`,
    value: groupOf,
  },
  {
    id: 'curve',
    head: 'curve',
    name: 'contrast curve',
    className: wider,
    isUnsorted: true,
    isUnwritten: true,
    value: () => null,
    cell: ({ name, curves }) => {
      const curve = curves.at(-1);
      return (
        curve && (
          <Sparkline
            width={68}
            xs={Float64Array.from(curve.separationArcsec)}
            ys={Float64Array.from(curve.contrastMag)}
            isLogX
            isDownward
            label={`Contrast curve of ${name}`}
          />
        )
      );
    },
  },
  probabilityColumn(yardstick),
  {
    id: 'also',
    head: 'also in',
    name: 'also in',
    className: wide,
    value: ({ alsoIn }) => alsoIn.map(({ name }) => name).join('; ') || null,
    cell: ({ alsoIn }) => (
      <span className="flex flex-wrap gap-x-2">
        {alsoIn.length === 0 && '–'}
        {alsoIn.map((survey) => (
          <span
            key={survey.slug}
            className="border-l-[3px] pl-1.5 text-[12px] tracking-wide"
            style={{ borderColor: seriesColour(survey.position) }}
          >
            {survey.name}
          </span>
        ))}
      </span>
    ),
  },
  {
    id: 'check',
    head: 'check',
    name: 'check',
    value: (target) => checkWords(target) || null,
    cell: (target) => <MapMark target={target} />,
  },
];

const sharing: Facet<TargetView> = {
  id: 'shared',
  label: 'Other surveys',
  any: 'any survey',
  options: [
    { value: 'yes', label: 'in another survey' },
    { value: 'no', label: 'in this survey only' },
  ],
  keeps: ({ alsoIn }, value) => alsoIn.length > 0 === (value === 'yes'),
};

interface TargetTableProps {
  targets: TargetView[];
  /** What detection probabilities are averaged over. */
  yardstick: YardstickView;
  selectedId: string | null;
  onSelect(id: string): void;
}

/** Targets with filters that combine; the count of what is shown is always said. */
export function TargetTable({ targets, yardstick, selectedId, onSelect }: TargetTableProps) {
  const facets = useMemo(() => {
    const groups = [...new Set(targets.map(groupOf))].sort();
    const group: Facet<TargetView> = {
      id: 'group',
      label: 'Group',
      any: 'any group',
      options: groups.map((name) => ({ value: name, label: name })),
      keeps: (target, value) => groupOf(target) === value,
    };
    return [group, sharing];
  }, [targets]);
  return (
    <DataTable
      caption="Targets of the survey"
      rows={targets}
      columns={[nameColumn(selectedId, onSelect), ...columnsOf(yardstick)]}
      rowId={({ id }) => id}
      noun={{ one: 'target', many: 'targets' }}
      searchLabel="Star, group or type"
      textOf={(target) => [target.name, target.spectralType, groupOf(target)].join(' ')}
      facets={facets}
      givenOrder="by right ascension"
      fileName="targets"
      currentId={selectedId}
      onRowClick={({ id }) => onSelect(id)}
    />
  );
}
