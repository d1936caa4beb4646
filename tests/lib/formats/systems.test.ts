import { describe, expect, it } from 'vitest';
import { faultsOf, notesOf, recordsOf } from './read-text';

const heading = 'system,weight,mass,semi_major_axis';

describe('readSystems(table)', () => {
  it('gathers companions by system, keeps empty systems and converts masses', () => {
    const text =
      'system,weight,mass [Mearth],semi_major_axis\nS1,1,317.8,5\nS2,2,,\nS1,1,3178,20\nS3,0.5,31.78,1\n';
    const { records, notes } = recordsOf('systems', text);
    const [systems] = records;
    expect(systems.weight).toEqual([1, 2, 0.5]);
    expect(systems.companionSystem).toEqual([0, 0, 2]);
    expect(systems.semiMajorAxisAu).toEqual([5, 20, 1]);
    expect(systems.massMjup[1] / systems.massMjup[0]).toBeCloseTo(10, 9);
    expect(systems.massMjup[0]).toBeCloseTo(1, 3);
    expect(notesOf(notes, 'information')).toContain('systems-empty at file');
  });

  it('counts every system the same where no weights are given', () => {
    const { records } = recordsOf('systems', 'system,mass,semi_major_axis\n1,2,3\n2,4,5\n');
    expect(records[0].weight).toEqual([1, 1]);
  });

  it.each([
    ['A,1,2,', 'value-missing at line 2, column "semi_major_axis"'],
    ['A,1,,3', 'value-missing at line 2, column "mass"'],
    ['A,1,-2,3', 'out-of-range at line 2, column "mass"'],
    ['A,-1,2,3', 'out-of-range at line 2, column "weight"'],
    ['A,,2,3', 'value-missing at line 2, column "weight"'],
    [',1,2,3', 'value-missing at line 2, column "system"'],
    ['A,1,2,3\nA,2,2,4', 'value-conflict at line 3, system "A", column "weight"'],
    ['A,1,2,3\nA,1,,', 'value-conflict at line 3, system "A"'],
    ['A,1,,\nA,1,2,3', 'value-conflict at line 3, system "A"'],
    ['A,0,2,3', 'too-few at line 1'],
    ['A,1,,', 'too-few at line 1'],
  ])('refuses %j', (rows, fault) => {
    expect(faultsOf('systems', `${heading}\n${rows}\n`)).toEqual([fault]);
  });
});
