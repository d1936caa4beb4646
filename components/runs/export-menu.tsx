'use client';

import { ExportButton } from '@/components/exports/export-button';
import type { RunSummary } from '@/lib/schemas/runs';

const drawings = [
  { name: 'posterior.svg', label: 'Posterior, SVG' },
  { name: 'posterior.pdf', label: 'Posterior, PDF' },
];

/** Files made from a finished run; each says how the run stands. */
export function ExportMenu({ collaboration, run }: { collaboration: string; run: RunSummary }) {
  return (
    <ExportButton
      collaboration={collaboration}
      source={['runs', run.id]}
      title={`Files of run ${run.number}`}
      drawings={drawings}
    />
  );
}
