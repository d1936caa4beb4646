import { ProvenanceChain, type ProvenanceStep } from '@/components/ui/provenance-chain';
import { formatPlain } from '@/lib/quantities/display';
import type { RunView } from '@/lib/schemas/runs';
import { durationOf, fingerprint, formatDay } from './time-words';

/** Everything that a run's number was made from, a step each. */
export function Provenance({ collaboration, run }: { collaboration: string; run: RunView }) {
  return <ProvenanceChain steps={provenanceSteps(collaboration, run)} />;
}

export function provenanceSteps(collaboration: string, run: RunView): ProvenanceStep[] {
  const { inputs, result } = run;
  if (!inputs) return [];
  const entries = inputs.surveys.reduce((sum, survey) => sum + survey.entries, 0);
  const { massMjup, semiMajorAxisAu } = inputs.grid;
  const names = inputs.surveys.map((survey) => survey.name).join(', ');
  const took = durationOf(run.job);
  return [
    {
      kind: 'Stars',
      what: `${inputs.stars.length} unique of ${entries} entries`,
      by: leftOutWords(inputs.leftOut.length),
    },
    {
      kind: 'Surveys',
      what: inputs.surveys.length === 1 ? names : `${inputs.surveys.length} surveys`,
      by: inputs.surveys.length === 1 ? undefined : names,
    },
    {
      kind: 'Cooling model',
      what: inputs.cooling,
      by:
        result && result.shareFlaggedCooling > 0
          ? `${formatPlain(100 * result.shareFlaggedCooling, 2)}\u2009% beyond its validity`
          : undefined,
    },
    {
      kind: 'Maps',
      what: `${inputs.stars.length} maps, ${massMjup.length} × ${semiMajorAxisAu.length} nodes`,
      by: `${inputs.eccentricity}; ${inputs.threshold}; ${inputs.combination}`,
      fingerprint: run.inputsDigest ? fingerprint(run.inputsDigest) : undefined,
    },
    {
      kind: 'Population',
      what: `${inputs.population.key} ${inputs.population.name}`,
      by: `version ${inputs.population.version}`,
      fingerprint: fingerprint(inputs.population.digest),
      href: `/${collaboration}/populations/${inputs.population.key}`,
    },
    {
      kind: 'Run',
      what: `${run.analysis.key}, run ${run.number}`,
      by: [
        run.createdBy,
        run.finishedAt ? formatDay(run.finishedAt) : undefined,
        took,
        `engine ${run.engineVersion}`,
        `seed ${run.seed}`,
      ]
        .filter(Boolean)
        .join(', '),
      fingerprint: run.resultDigest ? fingerprint(run.resultDigest) : undefined,
    },
  ];
}

function leftOutWords(count: number): string | undefined {
  if (count === 0) return undefined;
  return `${count} left out with a reason`;
}

/** The whole digests, for whoever compares them. */
export function DigestList({ run }: { run: RunView }) {
  const rows = [
    ['inputs', run.inputsDigest],
    ['result', run.resultDigest],
    ['population', run.inputs?.population.digest ?? null],
  ].filter((row): row is [string, string] => row[1] !== null);
  return (
    <details className="mt-3 text-note">
      <summary className="w-max text-act max-md:py-3">Full fingerprints</summary>
      <dl className="mt-2 grid grid-cols-[auto_1fr] gap-x-3.5 gap-y-1 text-ink2">
        {rows.map(([name, digest]) => (
          <div key={name} className="contents">
            <dt className="text-ink3">{name}</dt>
            <dd className="break-all">{digest}</dd>
          </div>
        ))}
      </dl>
    </details>
  );
}
