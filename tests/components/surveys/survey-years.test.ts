import { describe, expect, it } from 'vitest';
import { wantedWords } from '@/components/ui/form/field-words';
import { createSurveySchema, surveyFactsSchema, updateSurveySchema } from '@/lib/schemas/surveys';

const years = (observedFrom: number | null, observedTo: number | null) => ({
  name: 'Halyard',
  band: 'H',
  observedFrom,
  observedTo,
});

describe('the years of a survey', () => {
  it.each([
    ['form', surveyFactsSchema],
    ['route that adds', createSurveySchema],
    ['route that changes', updateSurveySchema],
  ])('end no earlier than they begin: %s', (_, schema) => {
    const [fault] = schema.safeParse(years(2014, 2010)).error?.issues ?? [];
    expect(fault.path).toEqual(['observedTo']);
    expect(wantedWords(fault.message)).toBe('Expected a last year that is not before the first');
    for (const [from, to] of [
      [2010, 2010],
      [2010, 2014],
      [2014, null],
      [null, 2010],
    ])
      expect(schema.safeParse(years(from, to)).success).toBe(true);
  });
});
