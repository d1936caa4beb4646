import { seriesColour } from '@/components/charts/series';
import type { DataColumn, Facet } from '@/components/ui/data-table/column';
import { DataTable } from '@/components/ui/data-table/data-table';
import { Link } from '@/components/ui/link';
import { SeriesKey } from '@/components/ui/series-key';
import type { AgeValue, DistanceValue, StarView } from '@/lib/schemas/stars';
import type { YardstickView } from '@/lib/schemas/yardstick';
import { probabilityColumn } from './probability-column';
import { ageNumbers, conflictWords, distanceNumbers } from './star-words';

function Source({ words, conflict }: { words: string; conflict: string | null }) {
  return (
    <span className="block whitespace-nowrap text-[12px] text-ink3">
      {words}
      {conflict !== null && <b className="text-warn">, {conflict}</b>}
    </span>
  );
}

/** The middle of an age, in Myr; of a range its middle in the logarithm. */
function ageMyrOf({ ageMyr, ageMinMyr, ageMaxMyr }: AgeValue): number | null {
  if (ageMyr !== null) return ageMyr;
  return ageMinMyr === null || ageMaxMyr === null ? null : Math.sqrt(ageMinMyr * ageMaxMyr);
}

const distancePcOf = ({ distancePc, parallaxMas }: DistanceValue) =>
  distancePc ?? (parallaxMas === null ? null : 1000 / parallaxMas);

/** A conflict counts while no value was adopted. */
function openConflict(star: StarView, quantity: 'age' | 'distance'): string | null {
  return star[quantity]?.source.kind === 'adopted' ? null : conflictWords(star.conflicts[quantity]);
}

const nameColumn = (collaboration: string): DataColumn<StarView> => ({
  id: 'star',
  head: 'star',
  name: 'star',
  isRowHead: true,
  className: 'whitespace-nowrap',
  value: ({ name }) => name,
  also: [
    { name: 'other names', value: ({ otherNames }) => otherNames.join('; ') || null },
    { name: 'Gaia DR3', value: ({ gaiaDr3Id }) => gaiaDr3Id },
  ],
  cell: (star) => (
    <>
      <Link
        href={`/${collaboration}/stars/${star.id}`}
        className="max-md:inline-flex max-md:min-h-11 max-md:items-center"
      >
        {star.name}
      </Link>
      {star.otherNames.length > 0 && (
        <span className="block max-w-[26ch] truncate font-normal text-[12px] text-ink3">
          {star.otherNames.join(', ')}
        </span>
      )}
      {star.undecided > 0 && (
        <span className="block font-normal text-[12px] text-warn">pair to decide</span>
      )}
    </>
  ),
});

const valueColumns: DataColumn<StarView>[] = [
  {
    id: 'surveys',
    head: 'surveys',
    name: 'surveys',
    className: 'max-md:hidden',
    value: ({ entries }) => entries.map(({ survey }) => survey.name).join('; '),
    cell: ({ entries }) => (
      <span className="flex flex-wrap gap-x-3">
        {entries.map(({ targetId, survey }) => (
          <SeriesKey key={targetId} colour={seriesColour(survey.position)}>
            {survey.name}
          </SeriesKey>
        ))}
      </span>
    ),
  },
  {
    id: 'age',
    head: 'age, Myr',
    name: 'age, Myr',
    isNumeric: true,
    value: ({ age }) => age && ageMyrOf(age.value),
    also: [
      { name: 'age at 16 per cent, Myr', value: ({ age }) => age?.value.ageLowerMyr ?? null },
      { name: 'age at 84 per cent, Myr', value: ({ age }) => age?.value.ageUpperMyr ?? null },
      { name: 'source of the age', value: ({ age }) => age?.source.words ?? null },
    ],
    cell: (star) =>
      star.age === null ? (
        '–'
      ) : (
        <>
          {ageNumbers(star.age.value)}
          <Source words={star.age.source.words} conflict={openConflict(star, 'age')} />
        </>
      ),
  },
  {
    id: 'distance',
    head: 'distance, pc',
    name: 'distance, pc',
    isNumeric: true,
    className: 'max-md:hidden',
    value: ({ distance }) => distance && distancePcOf(distance.value),
    also: [
      {
        name: 'distance error, pc',
        value: ({ distance }) => distance?.value.distanceErrorPc ?? null,
      },
      { name: 'source of the distance', value: ({ distance }) => distance?.source.words ?? null },
    ],
    cell: (star) =>
      star.distance === null ? (
        '–'
      ) : (
        <>
          {distanceNumbers(star.distance.value)}
          <Source words={star.distance.source.words} conflict={openConflict(star, 'distance')} />
        </>
      ),
  },
  {
    id: 'epochs',
    head: 'epochs',
    name: 'epochs',
    isNumeric: true,
    className: 'max-md:hidden',
    value: ({ epochs }) => epochs,
  },
];

const questions: Record<string, { label: string; keeps(star: StarView): boolean }> = {
  shared: { label: 'in several surveys', keeps: ({ entries }) => entries.length > 1 },
  undecided: { label: 'with a pair to decide', keeps: ({ undecided }) => undecided > 0 },
  'age-conflict': {
    label: 'ages differ over 2 σ',
    keeps: (star) => openConflict(star, 'age') !== null,
  },
  'distance-conflict': {
    label: 'distances differ over 2 σ',
    keeps: (star) => openConflict(star, 'distance') !== null,
  },
  adopted: {
    label: 'with an adopted value',
    keeps: ({ age, distance }) =>
      age?.source.kind === 'adopted' || distance?.source.kind === 'adopted',
  },
};

const only: Facet<StarView> = {
  id: 'only',
  label: 'Show',
  any: 'all stars',
  options: Object.entries(questions).map(([value, { label }]) => ({ value, label })),
  keeps: (star, value) => questions[value]?.keeps(star) ?? true,
};

interface StarTableProps {
  collaboration: string;
  stars: StarView[];
  surveys: { slug: string; name: string }[];
  /** What detection probabilities are averaged over. */
  yardstick: YardstickView | null;
}

/** One row a star, each once, with the values that its maps rest on. */
export function StarTable({ collaboration, stars, surveys, yardstick }: StarTableProps) {
  const survey: Facet<StarView> = {
    id: 'survey',
    label: 'Survey',
    any: 'any survey',
    options: surveys.map(({ slug, name }) => ({ value: slug, label: name })),
    keeps: ({ entries }, slug) => entries.some((entry) => entry.survey.slug === slug),
  };
  return (
    <DataTable
      caption="Stars, each once"
      rows={stars}
      columns={[
        nameColumn(collaboration),
        ...valueColumns,
        probabilityColumn(yardstick, 'by the survey that sees most'),
      ]}
      rowId={({ id }) => id}
      noun={{ one: 'star', many: 'stars' }}
      searchLabel="Name or Gaia number"
      textOf={({ name, otherNames, gaiaDr3Id }) => [name, ...otherNames, gaiaDr3Id].join(' ')}
      facets={[survey, only]}
      fileName={`${collaboration}-stars`}
    />
  );
}
