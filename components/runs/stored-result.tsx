'use client';

import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { startRun } from '@/components/hooks/use-runs';
import { WithdrawnNotices } from '@/components/sharing/withdrawn-notice';
import { RecordedStatementCopy } from '@/components/statement/statement-copy';
import { CalibrationCheck } from '@/components/studies/calibration/calibration-check';
import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { PageTitle } from '@/components/ui/page-title';
import { Conditions, conditionRow, Plate } from '@/components/ui/plate';
import type { AnalysisView } from '@/lib/schemas/analyses';
import type { RunView } from '@/lib/schemas/runs';
import { NoRunPlate } from './no-run-plate';
import { RunEnded, RunProgress } from './run-progress';

interface StoredResultProps {
  collaboration: string;
  analysis: AnalysisView;
  /** Newest finished run, with its result. */
  run: RunView | null;
  onChanged(): void;
}

/** A result as it is stored: its sentence and conditions, where no control can follow the law. */
export function StoredResult({ collaboration, analysis, run, onChanged }: StoredResultProps) {
  const [isBusy, setBusy] = useState(false);
  const [problem, setProblem] = useState<string>();
  const newest = analysis.runs[0];
  const isOnItsWay = newest?.job.status === 'waiting' || newest?.job.status === 'running';
  const hasEnded = newest?.job.status === 'failed' || newest?.job.status === 'cancelled';
  const again = async () => {
    setBusy(true);
    setProblem(undefined);
    try {
      await startRun(collaboration, analysis.key);
      onChanged();
    } catch (reason) {
      setProblem(sentenceOf(reason));
    } finally {
      setBusy(false);
    }
  };
  const shared = { collaboration, canStop: analysis.can.run, onChanged };
  return (
    <>
      <PageTitle
        title={analysis.name}
        crumbs={[
          { href: `/${collaboration}/analyses`, label: 'Analyses' },
          { label: analysis.key },
        ]}
        actions={
          run?.result && analysis.can.run && !isOnItsWay ? (
            <Button onClick={again} isBusy={isBusy}>
              Run again
            </Button>
          ) : undefined
        }
      />
      <div className="mb-4 grid gap-3">
        <Notice tone="warn" title="Shown as it is stored.">
          The controls of this page know plain power laws only; this population is another one, so a
          change of it is a new version and a new run.
        </Notice>
        <WithdrawnNotices surveys={run?.withdrawn} />
        {isOnItsWay && newest && <RunProgress run={newest} {...shared} />}
        {hasEnded && newest && <RunEnded run={newest} {...shared} />}
        {problem !== undefined && (
          <Notice tone="bad" title="The run was not started." isAnnounced>
            {problem}
          </Notice>
        )}
      </div>
      {run?.result ? (
        <>
          <Plate>
            <p className="statement mb-5">{run.result.statement.sentence}</p>
            <Conditions rows={run.result.statement.conditions.map(conditionRow)} />
            <div className="mt-2 -ml-1">
              <RecordedStatementCopy collaboration={collaboration} runId={run.id} />
            </div>
          </Plate>
          <div className="px-0.5 pt-3.5">
            <CalibrationCheck
              collaboration={collaboration}
              analysisKey={analysis.key}
              runId={run.id}
            />
          </div>
        </>
      ) : (
        <NoRunPlate
          collaboration={collaboration}
          analysis={analysis}
          isOnItsWay={isOnItsWay}
          onStarted={onChanged}
        />
      )}
    </>
  );
}
