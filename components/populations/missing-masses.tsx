import type { LiveSample } from '@/components/runs/live-sample';
import { Notice } from '@/components/ui/notice';
import { type Population, starsWithoutMass } from '@/lib/population';
import { hostMassesOf } from './spread';

const NAMED = 8;

/** Names of the stars whose mass the population needs and nobody has given. */
export function missingMasses(sample: LiveSample, population: Population): string[] {
  return starsWithoutMass(population, hostMassesOf(sample), sample.stars.length).map(
    (star) => sample.stars[star].name,
  );
}

interface MissingMassesProps {
  population: Population;
  sample: LiveSample;
  missing: string[];
}

/** Which stars stand in the way of a limit, by name, and what to do. */
export function MissingMasses({ population, sample, missing }: MissingMassesProps) {
  if (missing.length === 0) return null;
  const named = missing.slice(0, NAMED).join(', ');
  const rest = missing.length - NAMED;
  const stars = sample.stars.length;
  const isAll = missing.length === stars;
  const what = population.form === 'mass-ratio' ? 'a mass ratio' : 'a rate that scales with mass';
  return (
    <Notice
      tone="warn"
      title={
        isAll
          ? `None of the ${stars} stars has a mass, which ${what} needs.`
          : `${missing.length} of ${stars} stars ${missing.length === 1 ? 'has' : 'have'} no mass, which ${what} needs.`
      }
    >
      {named}
      {rest > 0 && ` and ${rest} more`}. There is no limit until each has one: import the column
      mass with the targets of their survey.
      {!isAll && ' What is drawn here leaves these stars out.'}
    </Notice>
  );
}
