'use client';

import { exportAddress } from '@/components/hooks/use-runs';
import { Menu } from '@/components/ui/menu';
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
      <p className="px-3.5 py-1 text-chart text-ink3">
        Draft, run {run.number}: said in every file
      </p>
      {files.map((file) => (
        <a
          key={file.name}
          href={exportAddress(collaboration, run.id, file.name)}
          download
          data-menu-item=""
          className="flex min-h-9 w-full items-center px-3.5 py-1 text-ink text-note hover:bg-act-soft hover:no-underline focus-visible:-outline-offset-2 max-lg:min-h-11"
        >
          {file.label}
        </a>
      ))}
    </Menu>
  );
}
