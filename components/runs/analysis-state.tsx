'use client';

import dynamic from 'next/dynamic';
import { useState } from 'react';
import { StateMark } from '@/components/ui/state-mark';
import { TextAction } from '@/components/ui/text-action';
import type { AnalysisView } from '@/lib/schemas/analyses';
import type { RunSummary } from '@/lib/schemas/runs';

const RenameDialog = dynamic(async () => (await import('./rename-dialog')).RenameDialog);

interface Standing {
  analysis: AnalysisView;
  /** A control was moved and nothing has kept it. */
  isUnsaved?: boolean;
  /** Newest finished run. */
  run: RunSummary | undefined;
}

interface AnalysisStateProps extends Standing {
  collaboration: string;
  onChanged(): void;
}

/** Where an analysis stands, beside its key; a name that no frozen run bears may change. */
export function AnalysisState({ collaboration, onChanged, ...standing }: AnalysisStateProps) {
  const { analysis } = standing;
  const [isNaming, setNaming] = useState(false);
  return (
    <>
      <StandingMark {...standing} />
      {analysis.can.change && analysis.runs.every(({ frozen }) => frozen === null) && (
        <TextAction onClick={() => setNaming(true)}>Rename</TextAction>
      )}
      {isNaming && (
        <RenameDialog
          {...{ collaboration, analysis }}
          onClose={() => setNaming(false)}
          onSaved={onChanged}
        />
      )}
    </>
  );
}

function StandingMark({ analysis, isUnsaved = false, run }: Standing) {
  if (isUnsaved) return <StateMark kind="unsaved">Unsaved change</StateMark>;
  switch (analysis.state) {
    case 'running':
      return <StateMark kind="running">Running</StateMark>;
    case 'failed':
      return <StateMark kind="bad">Draft, run {analysis.runs[0]?.number} failed</StateMark>;
    case 'changed':
      return <StateMark kind="unsaved">Draft, changed since run {run?.number}</StateMark>;
    case 'run':
      if (run?.frozen) {
        const words = run.frozen === 'released' ? 'Released' : 'Frozen';
        return (
          <StateMark kind={run.frozen}>
            {words}, run {run.number}
          </StateMark>
        );
      }
      return <StateMark kind="draft">Draft, run {run?.number}, all changes saved</StateMark>;
    case 'draft':
      return <StateMark kind="draft">Draft, no run yet</StateMark>;
  }
}
