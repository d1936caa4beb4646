import type { WrittenTable } from '@/lib/formats';
import { type FinishedRun, standingOf } from '../export-limits';
import { SOFTWARE } from './software';

type Provenance = WrittenTable['provenance'];

/** What a file of a run says of itself, in this order in every container that has room for it. */
export function runProvenance(run: FinishedRun): Provenance {
  const { inputs, result, release } = run;
  const { population } = inputs;
  const standing: Provenance = release
    ? [
        ['state', `release: ${release.title}, version ${release.version}`],
        ['licence', release.licence],
        ['address', release.address],
        ['authors', release.authors.map(({ name }) => name).join(', ')],
      ]
    : [['state', standingOf(run)]];
  return [
    ...standing,
    ['software', SOFTWARE],
    ['engine', run.engineVersion],
    ...(inputs.mapEngines ? [['map_engines', inputs.mapEngines.join(', ')] as const] : []),
    ['analysis', `${run.analysis}, ${run.analysisName}`],
    ['run', `${run.analysis}, run ${run.number}`],
    ...(run.finishedAt === null ? [] : [['computed', run.finishedAt] as const]),
    ['statement', result.statement.sentence],
    ...result.statement.conditions.map(
      (condition, i) => [`condition_${i + 1}`, condition] as const,
    ),
    ['surveys', inputs.surveys.map(({ name, slug }) => `${name} (${slug})`).join(', ')],
    ['population', `${population.key} version ${population.version}, ${population.name}`],
    ['population_digest', population.digest],
    ['seed', run.seed],
    ...(run.inputsDigest === null ? [] : [['inputs_digest', run.inputsDigest] as const]),
    ['result_digest', run.resultDigest],
  ];
}
