import { describe, expect, it } from 'vitest';
import { previewWords } from '@/components/stars/preview-words';
import type { AdoptionPreview } from '@/lib/schemas/stars';

const preview = (given: Partial<AdoptionPreview>): AdoptionPreview => ({
  lead: { key: 'A-1', name: 'All surveys', run: 3 },
  level: 0.95,
  isFraction: true,
  stars: 1,
  before: 0.058,
  after: 0.0609,
  missing: null,
  ...given,
});

describe('previewWords(preview)', () => {
  it('states both limits with their level, the change and how many maps it rests on', () => {
    expect(previewWords(preview({}))).toBe(
      'The limit of the lead analysis A-1, run 3 would move from <5.80\u2009% to <6.09\u2009% (95\u2009%), by +5.0\u2009%: 1 of its stars is mapped anew, all others as in that run.',
    );
    expect(previewWords(preview({ stars: 4, after: 0.0522 }))).toContain(
      'by −10\u2009%: 4 of its stars are mapped anew',
    );
  });

  it('says that the limit stays where nothing is seen of a move or no star is concerned', () => {
    expect(previewWords(preview({ after: 0.058001 }))).toContain(
      'stays at <5.80\u2009% (95\u2009%)',
    );
    expect(previewWords(preview({ stars: 0, after: 0.058 }))).toBe(
      'No star of the lead analysis (A-1, run 3) is concerned: its limit stays.',
    );
  });

  it('gives the reason where there is no preview', () => {
    expect(previewWords(preview({ after: null, missing: 'A new run tells' }))).toBe(
      'How the limit of A-1, run 3 would move is not computed here. A new run tells.',
    );
    const none = { lead: null, before: null, after: null, missing: 'No analysis has run yet' };
    expect(previewWords(preview(none))).toBe('No analysis has run yet.');
  });
});
