import { InputError } from '@/lib/errors';
import type { Population } from '@/lib/population';
import type { SettingsOf } from '@/lib/schemas/study-settings';

export function refuse(item: string, message: string, code = 'not-allowed-here'): never {
  throw new InputError({ code, item, message });
}

type Sweep = SettingsOf<'sweep'>;
type Laws = Exclude<Population, { form: 'systems' }>;

const overIndices = {
  'mass-index': ['mass'],
  'semi-major-axis-index': ['semiMajorAxis'],
  'both-indices': ['mass', 'semiMajorAxis'],
} as const;

/** Whether a population has an index to change along an axis. */
function hasIndex(population: Laws, axis: 'mass' | 'semiMajorAxis'): boolean {
  if (population.form === 'power-law') return true;
  if (population.form === 'shaped') return population[axis].shape === 'power-law';
  return axis === 'semiMajorAxis' && population.semiMajorAxis.shape === 'power-law';
}

function requireLaws(over: Sweep['over'], population: Population): Laws {
  if (population.form === 'systems') {
    refuse('over', 'A table of systems has no cutoffs and no indices to change');
  }
  if (population.form === 'mass-ratio' && !over.startsWith('semi-major-axis')) {
    refuse('over', 'A law in the mass ratio has other masses for each star: change its axis');
  }
  return population;
}

/**
 * Refuses a sweep whose parameter the population does not have, or whose values leave no range.
 *
 * @throws InputError whose fault names the setting
 */
export function checkSweep(sweep: Sweep, population: Population): void {
  const { over, from, to } = sweep;
  const laws = requireLaws(over, population);
  if (over in overIndices) {
    const axes = overIndices[over as keyof typeof overIndices];
    if (axes.some((axis) => !hasIndex(laws, axis))) {
      refuse('over', 'An index can be changed only of a power law, and this law is none');
    }
    if (from < -10 || to > 10) refuse('from', 'Indices lie between -10 and 10', 'out-of-range');
    return;
  }
  if (from <= 0) refuse('from', `Found ${from}; expected more than 0`, 'out-of-range');
  checkEnds(sweep, laws);
}

function checkEnds({ over, from, to }: Sweep, laws: Laws): void {
  const isAxis = over.startsWith('semi-major-axis');
  const unit = isAxis ? 'AU' : 'MJ';
  const [low, high] = isAxis
    ? [laws.semiMajorAxisMinAu, laws.semiMajorAxisMaxAu]
    : laws.form === 'mass-ratio'
      ? [laws.massRatioMin, laws.massRatioMax]
      : [laws.massMinMjup, laws.massMaxMjup];
  if (over.endsWith('-min') && to >= high) {
    refuse('to', `Found ${to}; expected less than the upper end, ${high} ${unit}`, 'range-order');
  }
  if (over.endsWith('-max') && from <= low) {
    refuse(
      'from',
      `Found ${from}; expected more than the lower end, ${low} ${unit}`,
      'range-order',
    );
  }
}
