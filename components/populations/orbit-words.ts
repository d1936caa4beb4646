import type { DrawnRun } from '@/lib/schemas/runs';

/** Where the orbits of a preview come from. */
export function orbitWords(run: DrawnRun | null): string {
  const origin = 'Orbits belong to the maps: they are set with each survey.';
  if (!run?.inputs) return `Isotropic. ${origin}`;
  return `Isotropic; ${run.inputs.eccentricity}, in ${run.analysis.key}, run ${run.number}. ${origin}`;
}
