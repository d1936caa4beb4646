import { expect, it } from 'vitest';
import { nameOfStudy } from '@/lib/services/study-words';

it('names the parameter of a sweep with its unit', () => {
  const span = { kind: 'sweep' as const, from: 60, to: 900, count: 31 };
  expect(nameOfStudy({ ...span, over: 'semi-major-axis-max' })).toBe(
    'Limit against largest semi-major axis, AU',
  );
  expect(nameOfStudy({ ...span, over: 'mass-index' })).toBe('Limit against mass index');
});
