import { memo } from 'react';
import { FoldSection } from '@/components/ui/fold-section';
import { FormulaWords } from '@/components/ui/formula-words';
import { ProvenanceChain, type ProvenanceStep } from '@/components/ui/provenance-chain';
import { useDay } from '@/components/ui/time-zone';
import { formatPlain, formatSignificant } from '@/lib/quantities/display';
import type { DrawnResult, DrawnRun } from '@/lib/schemas/runs';
import { durationOf, fingerprint } from './time-words';

interface ProvenanceSectionProps {
  collaboration: string;
  run: DrawnRun;
  result: DrawnResult;
  /** The page shows a change that the run does not know. */
  isLive?: boolean;
}

/** Everything that a run's number was made from, a step each. */
export const ProvenanceSection = memo(function ProvenanceSection(props: ProvenanceSectionProps) {
  const { collaboration, run, result, isLive = false } = props;
  const steps = provenanceSteps(collaboration, run, useDay());
  return (
    <FoldSection
      number={6}
      title="Provenance"
      help="fingerprint"
      context={
        isLive
          ? `run ${run.number}; a live change is not recorded until you save`
          : 'everything this number was made from, unchanged since the run'
      }
      answer={`${steps.length} steps, unchanged since run ${run.number}`}
    >
      <ProvenanceChain steps={steps} />
      <ProvenanceDetails run={run} result={result} />
    </FoldSection>
  );
});

function provenanceSteps(
  collaboration: string,
  run: DrawnRun,
  day: (moment: string) => string,
): ProvenanceStep[] {
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
    ...(inputs.shared ?? []).map(({ survey, owner, attribution, version }) => ({
      kind: 'Shared',
      what: `${survey}, by ${owner}`,
      by: attribution,
      fingerprint: fingerprint(version),
    })),
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
      by: `${engineWords(inputs.mapEngines)}, ${inputs.eccentricity}`,
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
        run.finishedAt ? day(run.finishedAt) : undefined,
        took,
        `engine ${run.engineVersion}`,
      ]
        .filter(Boolean)
        .join(', '),
      fingerprint: run.resultDigest ? fingerprint(run.resultDigest) : undefined,
    },
  ];
}

/** Which engine made the maps: not always the one that computed the run. */
function engineWords(engines: string[] | undefined): string {
  if (!engines) return 'engine of the maps not recorded';
  return engines.length === 0 ? 'as uploaded' : `maps of engine ${engines.join(' and ')}`;
}

function leftOutWords(count: number): string | undefined {
  if (count === 0) return undefined;
  return `${count} left out with a reason`;
}

/** What stands in no step: how maps were combined and judged, and the whole digests. */
function ProvenanceDetails({ run, result }: { run: DrawnRun; result: DrawnResult }) {
  const { inputs } = run;
  const rows = [
    ['statement', result.statement.sentence],
    ['threshold', inputs?.threshold],
    ['stars in several surveys', inputs?.combination],
    ['sum over stars', `${formatSignificant(result.exposure, 6)} of ${result.stars}`],
    ['inputs', run.inputsDigest],
    ['result', run.resultDigest],
    ['population', inputs?.population.digest],
    ['seed', run.seed],
  ].filter((row): row is [string, string] => Boolean(row[1]));
  return (
    <details className="mt-4 text-note">
      <summary className="w-max text-act max-md:py-3">All conditions and full fingerprints</summary>
      <dl className="mt-2 grid grid-cols-[auto_1fr] gap-x-3.5 gap-y-1 text-ink2">
        {rows.map(([name, value]) => (
          <div key={name} className="contents">
            <dt className="text-ink3">{name}</dt>
            <dd className="min-w-0 break-words [overflow-wrap:anywhere]">{value}</dd>
          </div>
        ))}
      </dl>
      <ul className="mt-3 grid gap-1 text-ink2">
        {result.statement.conditions.map((condition) => (
          <li key={condition}>
            <FormulaWords text={condition} />
          </li>
        ))}
      </ul>
    </details>
  );
}
