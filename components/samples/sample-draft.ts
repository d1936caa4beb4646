import type { ZodType } from 'zod';
import type { SampleDefinition } from '@/lib/schemas/samples';

const ranges = ['ageMyr', 'distancePc', 'hostMassMsun'] as const;
export type RangeName = (typeof ranges)[number];

/** The form as it is typed: numbers are text until they are read. */
export interface SampleDraft {
  surveyIds: string[];
  typeFrom: string;
  typeTo: string;
  ranges: Record<RangeName, { min: string; max: string }>;
  movingGroups: string[];
  multiplicity: '' | 'single' | 'multiple';
  knownCompanion: SampleDefinition['knownCompanion'];
  unknown: SampleDefinition['unknown'];
}

const EMPTY_RANGE = { min: '', max: '' };

export const EMPTY_DRAFT: SampleDraft = {
  surveyIds: [],
  typeFrom: '',
  typeTo: '',
  ranges: { ageMyr: EMPTY_RANGE, distancePc: EMPTY_RANGE, hostMassMsun: EMPTY_RANGE },
  movingGroups: [],
  multiplicity: '',
  knownCompanion: 'left-out',
  unknown: 'left-out',
};

export function draftOf(definition: SampleDefinition): SampleDraft {
  const text = (value: number | undefined) => (value === undefined ? '' : String(value));
  const rangeOf = (name: RangeName) => ({
    min: text(definition[name]?.min),
    max: text(definition[name]?.max),
  });
  return {
    surveyIds: definition.surveyIds ?? [],
    typeFrom: definition.spectralType?.from ?? '',
    typeTo: definition.spectralType?.to ?? '',
    ranges: {
      ageMyr: rangeOf('ageMyr'),
      distancePc: rangeOf('distancePc'),
      hostMassMsun: rangeOf('hostMassMsun'),
    },
    movingGroups: definition.movingGroups ?? [],
    multiplicity: definition.multiplicity ?? '',
    knownCompanion: definition.knownCompanion,
    unknown: definition.unknown,
  };
}

/** A selection, or what is wrong with the form by its part. */
export type ReadDraft =
  | { definition: SampleDefinition; faults?: undefined }
  | { definition?: undefined; faults: Partial<Record<string, string>> };

export function readDraft(draft: SampleDraft, schema: ZodType<SampleDefinition>): ReadDraft {
  const { surveyIds, typeFrom, typeTo, movingGroups, multiplicity } = draft;
  const { knownCompanion, unknown } = draft;
  const number = (text: string) => (text.trim() === '' ? undefined : Number(text));
  const rangeParts = ranges.flatMap((name) => {
    const [min, max] = [number(draft.ranges[name].min), number(draft.ranges[name].max)];
    const ends = { ...(min !== undefined && { min }), ...(max !== undefined && { max }) };
    return Object.keys(ends).length === 0 ? [] : [[name, ends] as const];
  });
  const from = typeFrom || typeTo;
  const to = typeTo || typeFrom;
  const parsed = schema.safeParse({
    ...(surveyIds.length > 0 && { surveyIds }),
    ...(from !== '' && { spectralType: { from, to } }),
    ...Object.fromEntries(rangeParts),
    ...(movingGroups.length > 0 && { movingGroups }),
    ...(multiplicity !== '' && { multiplicity }),
    knownCompanion,
    unknown,
  });
  if (parsed.success) return { definition: parsed.data };
  const faults: Partial<Record<string, string>> = {};
  for (const { path, message } of parsed.error.issues) faults[path.join('.')] ??= wordsOf(message);
  return { faults };
}

function wordsOf(message: string): string {
  if (message.startsWith('Invalid input')) return 'a number';
  return message.startsWith('Too small') ? 'more than 0' : message;
}
