'use client';

import { exportAddress } from '@/components/hooks/use-runs';
import { Menu, MenuFile, MenuNote } from '@/components/ui/menu';
import type { RunSummary } from '@/lib/schemas/runs';

const files = [
  { name: 'limits.csv', label: 'Limits by level, CSV' },
  { name: 'posterior.csv', label: 'Posterior, CSV' },
  { name: 'run.json', label: 'Everything, JSON' },
  { name: 'limits.tex', label: 'Table, LaTeX' },
  { name: 'posterior.svg', label: 'Figure, SVG' },
];

/** Files made from a finished run; each says that it is a draft. */
export function ExportMenu({ collaboration, run }: { collaboration: string; run: RunSummary }) {
  return (
    <Menu label="Export" accessibleName={`Export files of run ${run.number}`} align="right">
      <MenuNote>Draft, run {run.number}: said in every file</MenuNote>
      {files.map((file) => (
        <MenuFile key={file.name} href={exportAddress(collaboration, run.id, file.name)}>
          {file.label}
        </MenuFile>
      ))}
    </Menu>
  );
}
