import { describe, expect, it } from 'vitest';
import {
  draftOf,
  EMPTY_DRAFT,
  readDraft as readBy,
  type SampleDraft,
} from '@/components/samples/sample-draft';
import { describeSample } from '@/lib/schemas/sample-words';
import { sampleDefinitionSchema } from '@/lib/schemas/samples';

const id = '7b1e9d4e-6f0a-4c57-9d0b-2f1d3c5a7e90';
const words = (definition: unknown) =>
  describeSample(sampleDefinitionSchema.parse(definition), () => 'Halyard');
const readDraft = (draft: SampleDraft) => readBy(draft, sampleDefinitionSchema);
const OUT = 'those chosen because a companion was known are left out';

describe('readDraft', () => {
  it('asks nothing where nothing is typed', () => {
    expect(readDraft(EMPTY_DRAFT).definition).toEqual({
      knownCompanion: 'left-out',
      unknown: 'left-out',
    });
  });

  it('gives back every definition that it was made from', () => {
    const definition = sampleDefinitionSchema.parse({
      surveyIds: [id],
      spectralType: { from: 'F', to: 'K' },
      ageMyr: { min: 10, max: 150 },
      distancePc: { max: 60.5 },
      hostMassMsun: { min: 0.4 },
      movingGroups: ['Halcyon'],
      multiplicity: 'single',
      knownCompanion: 'kept',
      unknown: 'kept',
    });
    expect(readDraft(draftOf(definition)).definition).toEqual(definition);
  });

  it('takes one type alone as a range of one', () => {
    const read = readDraft({ ...EMPTY_DRAFT, typeFrom: 'M' });
    expect(read.definition?.spectralType).toEqual({ from: 'M', to: 'M' });
  });

  it.each([
    [{ min: '50', max: '20' }, 'ageMyr.max', 'not below the lower end'],
    [{ min: '-3', max: '' }, 'ageMyr.min', 'more than 0'],
    [{ min: '', max: 'old' }, 'ageMyr.max', 'a number'],
  ])('names what is wrong with %j', (ageMyr, part, fault) => {
    const read = readDraft({ ...EMPTY_DRAFT, ranges: { ...EMPTY_DRAFT.ranges, ageMyr } });
    expect(read.definition).toBeUndefined();
    expect(read.faults?.[part]).toBe(fault);
  });
});

describe('describeSample', () => {
  it.each([
    [{}, `All stars; ${OUT}`],
    [{ surveyIds: [id] }, `Stars that Halyard lists; ${OUT}`],
    [{ ageMyr: { min: 10 } }, `Stars aged at least 10 Myr; ${OUT}`],
    [
      { surveyIds: [id], spectralType: { from: 'F', to: 'K' }, distancePc: { min: 5, max: 60 } },
      `Stars that Halyard lists, of spectral types F to K and at a distance of 5 to 60 pc; ${OUT}`,
    ],
    [
      { movingGroups: ['A', 'B', 'C'], multiplicity: 'multiple' },
      `Stars in the moving group A, B or C and listed as binary or multiple; ${OUT}`,
    ],
    [
      { hostMassMsun: { max: 1 }, unknown: 'kept', knownCompanion: 'kept' },
      'Stars with a mass of at most 1 solar masses; those chosen because a companion was known are kept, although they are no fair draw; stars of which a fact is not known are kept',
    ],
  ])('reads %j back', (definition, sentence) => {
    expect(words(definition)).toBe(sentence);
  });
});
