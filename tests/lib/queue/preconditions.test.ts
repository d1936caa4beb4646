import { describe, expect, it } from 'vitest';
import { findEdgeOutside, findEmptySelection, listFirst } from '@/lib/queue/preconditions';
import { POPULATION } from '../../support/population';

const reach = {
  massMinMjup: 1,
  massMaxMjup: 80,
  semiMajorAxisMinAu: 3,
  semiMajorAxisMaxAu: 1000,
};

describe('findEdgeOutside(population, reach)', () => {
  it('finds nothing where the maps hold the whole box, edges included', () => {
    expect(findEdgeOutside(POPULATION, reach)).toBeNull();
    const full = {
      ...POPULATION,
      massMinMjup: 1,
      massMaxMjup: 80,
      semiMajorAxisMinAu: 3,
      semiMajorAxisMaxAu: 1000,
    };
    expect(findEdgeOutside(full, reach)).toBeNull();
  });

  it.each([
    ['massMinMjup', 0.5, 'mass_min', 'Found 0.5 MJ; the maps begin at 1 MJ'],
    ['massMaxMjup', 90, 'mass_max', 'Found 90 MJ; the maps reach 80 MJ'],
    ['semiMajorAxisMinAu', 1, 'semi_major_axis_min', 'Found 1 AU; the maps begin at 3 AU'],
    ['semiMajorAxisMaxAu', 5000, 'semi_major_axis_max', 'Found 5000 AU; the maps reach 1000 AU'],
  ])('names %s beyond the maps, and the way on', (field, value, column, words) => {
    const fault = findEdgeOutside({ ...POPULATION, [field]: value }, reach);
    expect(fault).toMatchObject({ code: 'outside-map', column });
    expect(fault?.message).toBe(
      `${words}. Choose "completeness is zero outside the maps" to go on`,
    );
  });
});

describe('findEmptySelection(left, all)', () => {
  it('names both counts', () => {
    expect(findEmptySelection(0, 120)?.message).toBe(
      '0 of 120 targets are left; expected at least 1',
    );
    expect(findEmptySelection(1, 120)).toBeNull();
  });
});

describe('listFirst(names)', () => {
  it('lists five and counts the rest', () => {
    expect(listFirst(['A', 'B'])).toBe('A, B');
    expect(listFirst(['A', 'B', 'C', 'D', 'E', 'F', 'G'])).toBe('A, B, C, D, E and 2 more');
  });
});
