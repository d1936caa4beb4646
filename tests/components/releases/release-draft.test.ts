import { describe, expect, it } from 'vitest';
import { placeWords } from '@/components/releases/release-draft';

describe('placeWords', () => {
  it('names a field of the form as the form does', () => {
    expect(placeWords(['authors', 0, 'orcid'])).toBe('Author 1, ORCID iD');
    expect(placeWords(['authors'])).toBe('Authors');
    expect(placeWords(['runIds'])).toBe('Frozen runs');
    expect(placeWords([])).toBe('Form');
  });
});
