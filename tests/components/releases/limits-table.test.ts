import { describe, expect, it } from 'vitest';
import { levelColumns } from '@/components/releases/limits-table';

describe('levels of the table of limits', () => {
  it('hold a released level that is not among the usual ones', () => {
    const wide = levelColumns([0.997]).filter(
      ({ className }) => !className.startsWith('md:hidden'),
    );
    expect(wide.map(({ level }) => level)).toEqual([0.68, 0.9, 0.95, 0.99, 0.997]);
  });

  it('begin with the released one on a narrow screen, each level once', () => {
    const narrow = levelColumns([0.95, 0.95]).filter(
      ({ className }) => !className.includes('max-md:hidden'),
    );
    expect(narrow.map(({ level }) => level)).toEqual([0.95, 0.68, 0.9, 0.99]);
  });
});
