import { attachment } from '@/app/api/v1/attachment';
import { collaborationRoute } from '@/app/api/v1/handler';
import type { Actor } from '@/lib/access/actor';
import { runExportQuerySchema } from '@/lib/schemas/exports';
import { exportName, exportRun, getFinishedRun, recordExport } from '@/lib/services/exports';
import { figureAsPdf } from '@/lib/services/figures';
import { drawPosterior } from './posterior-drawing';

/** Files of a finished run, as attachments: tables, maps, words, everything, figures. */
export const GET = collaborationRoute(
  { scope: 'read', query: runExportQuerySchema },
  async ({ actor, params, query }) => {
    const { width, ...options } = query;
    return attachment(
      isFigure(params.file)
        ? await drawFigure(actor, params.run, params.file, width === '180' ? 180 : 88)
        : await exportRun(actor, params.run, params.file, options),
    );
  },
);

type Figure = 'posterior.svg' | 'posterior.pdf';

const isFigure = (file: string): file is Figure =>
  file === 'posterior.svg' || file === 'posterior.pdf';

async function drawFigure(actor: Actor, runId: string, file: Figure, widthMm: 88 | 180) {
  const run = await getFinishedRun(actor, runId);
  const fileName = exportName(run, file);
  const svg = drawPosterior(run, widthMm);
  const isPdf = file === 'posterior.pdf';
  const content = isPdf ? new Uint8Array(await figureAsPdf(svg)) : svg;
  await recordExport(actor, runId, fileName);
  return {
    fileName,
    content,
    contentType: isPdf ? 'application/pdf' : 'image/svg+xml; charset=utf-8',
  };
}
