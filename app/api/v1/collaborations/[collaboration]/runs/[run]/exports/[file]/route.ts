import { z } from 'zod';
import { collaborationRoute } from '@/app/api/v1/handler';
import type { Actor } from '@/lib/access/actor';
import { exportName, exportRun, getFinishedRun, recordExport } from '@/lib/services/exports';
import { drawPosterior } from './posterior-drawing';

const querySchema = z.strictObject({
  /** Of the LaTeX table. */
  style: z.enum(['deluxetable', 'tabular']).optional(),
  /** Of the figure, mm: one column or two. */
  width: z.enum(['88', '180']).default('88'),
});

/** Files of a finished run, as attachments: limits, posterior, everything, table, figure. */
export const GET = collaborationRoute(
  { scope: 'read', query: querySchema },
  async ({ actor, params, query }) => {
    const { fileName, contentType, text } =
      params.file === 'posterior.svg'
        ? await drawFigure(actor, params.run, query.width === '180' ? 180 : 88)
        : await exportRun(actor, params.run, params.file, query.style);
    return new Response(text, {
      headers: {
        'Content-Type': contentType,
        'Content-Disposition': `attachment; filename="${fileName}"`,
      },
    });
  },
);

async function drawFigure(actor: Actor, runId: string, widthMm: 88 | 180) {
  const run = await getFinishedRun(actor, runId);
  const fileName = exportName(run, 'posterior.svg');
  const text = drawPosterior(run, widthMm);
  await recordExport(actor, runId, fileName);
  return { fileName, contentType: 'image/svg+xml; charset=utf-8', text };
}
