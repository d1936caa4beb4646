import { removeStudy } from '@/components/hooks/use-studies';
import { fingerprint } from '@/components/runs/time-words';
import { RecordedStatementCopy } from '@/components/statement/statement-copy';
import { DeleteForGood } from '@/components/ui/delete-for-good';
import { Conditions, conditionRow } from '@/components/ui/plate';
import { ProvenanceChain, type ProvenanceStep } from '@/components/ui/provenance-chain';
import { SectionOpener } from '@/components/ui/section-opener';
import { useDay } from '@/components/ui/time-zone';
import type { StudyView } from '@/lib/schemas/studies';
import type { AskedRun } from './kind-entry';

/** The run's own sentence and conditions: no limit is shown without them. */
export function AnswerConditions({ asked, settings }: { asked: AskedRun; settings: string }) {
  const { statement } = asked.result;
  return (
    <section>
      <SectionOpener
        title="What it rests on"
        help="statement"
        context={`run ${asked.run.number}: ${statement.sentence}`}
        tools={
          <RecordedStatementCopy
            align="right"
            collaboration={asked.collaboration}
            runId={asked.run.id}
          />
        }
      />
      <div className="max-w-4xl">
        <Conditions
          rows={[
            { name: 'Question', value: settings },
            {
              name: 'Sample',
              value: `${asked.inputs.surveys.map(({ name }) => name).join(', ')}: ${asked.result.stars} stars of ${asked.result.entries} entries`,
            },
            ...statement.conditions.map(conditionRow),
          ]}
        />
      </div>
    </section>
  );
}

interface AnswerProvenanceProps {
  collaboration: string;
  study: StudyView;
  onDeleted(): void;
}

/** From which run, by whom, with which fingerprints; and the way to delete it. */
export function AnswerProvenance({ collaboration, study, onDeleted }: AnswerProvenanceProps) {
  const { inputs, run } = study;
  const day = useDay();
  const steps: ProvenanceStep[] = [
    {
      kind: 'Run',
      what: `${run.analysisKey}, run ${run.number}`,
      by: run.analysisName,
      fingerprint: inputs ? fingerprint(inputs.runResultDigest) : undefined,
      href: `/${collaboration}/analyses/${run.analysisKey}`,
    },
    {
      kind: 'Question',
      what: `question ${study.number}`,
      by: `${study.createdBy ?? 'a former member'}, ${day(study.createdAt)}`,
      fingerprint: study.inputsDigest ? fingerprint(study.inputsDigest) : undefined,
    },
    ...(inputs && inputs.further.length > 0
      ? [
          {
            kind: 'Also used',
            what:
              inputs.further.length === 1
                ? inputs.further[0].what
                : `${inputs.further.length} more inputs`,
            by: 'listed below with their fingerprints',
          },
        ]
      : []),
    {
      kind: 'Answer',
      what: study.finishedAt ? day(study.finishedAt) : 'not finished',
      by: `engine ${study.engineVersion}, seed ${study.seed}`,
      fingerprint: study.resultDigest ? fingerprint(study.resultDigest) : undefined,
    },
  ];
  const digests = [
    ['inputs of the run', inputs?.runInputsDigest],
    ['result of the run', inputs?.runResultDigest],
    ...(inputs?.further ?? []).map(({ what, digest }) => [what, digest]),
    ['inputs of the question', study.inputsDigest],
    ['answer', study.resultDigest],
    ['seed', study.seed],
    ['engine', study.engineVersion],
  ].filter((row): row is [string, string] => Boolean(row[1]));
  return (
    <section>
      <SectionOpener
        title="Provenance"
        context="everything this answer was made from, none of it changed since it was computed"
      />
      <ProvenanceChain steps={steps} />
      <details className="mt-4 text-note">
        <summary className="w-max text-act max-md:py-3">Full fingerprints</summary>
        <dl className="mt-2 grid grid-cols-[minmax(0,auto)_1fr] gap-x-3.5 gap-y-1 text-ink2">
          {digests.map(([name, value]) => (
            <div key={`${name} ${value}`} className="contents">
              <dt className="text-ink3">{name}</dt>
              <dd className="min-w-0 [overflow-wrap:anywhere]">{value}</dd>
            </div>
          ))}
        </dl>
      </details>
      {study.can.remove && (
        <div className="mt-4 [&>button]:-ml-2">
          <DeleteForGood
            label="Delete this answer"
            warning="The answer goes for good, with every map that it keeps; the run stays."
            onDelete={() => removeStudy(collaboration, study.id)}
            onDeleted={onDeleted}
          />
        </div>
      )}
    </section>
  );
}
