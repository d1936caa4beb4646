import { describe, expect, it } from 'vitest';
import { nameOfStudy } from '@/lib/services/study-words';
import { headlineOf } from '@/workers/tasks/study-words';

const sweep = { value: [-1.3, 0.2], limit: [0.03, 0.06], limitZero: [], exposure: [] };
const rest = { detections: [], isSetByPrior: [], plane: null, notes: [] };

describe('a sweep in words', () => {
  it('names its parameter with the unit', () => {
    const span = { kind: 'sweep' as const, from: 60, to: 900, count: 31 };
    expect(nameOfStudy({ ...span, over: 'semi-major-axis-max' })).toBe(
      'Limit against largest semi-major axis, AU',
    );
    expect(nameOfStudy({ ...span, over: 'mass-index' })).toBe('Limit against mass index');
  });

  it('quotes an index as dN/dM and not as it is stored', () => {
    const result = { kind: 'sweep' as const, over: 'mass-index' as const, ...sweep, ...rest };
    expect(headlineOf(result, 'host_fraction')).toBe(
      '<3.0\u2009% at \u22122.3, <6.0\u2009% at \u22120.8',
    );
  });
});
