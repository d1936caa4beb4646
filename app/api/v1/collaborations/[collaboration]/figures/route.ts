import { collaborationRoute } from '@/app/api/v1/handler';
import { readText } from '@/app/api/v1/read-body';
import { figureAsPdf, longestFigureBytes } from '@/lib/services/figures';

/** A figure that a page drew, sent as SVG, comes back as PDF. */
export const POST = collaborationRoute(
  { scope: 'read', rawBody: true, limit: 'figures' },
  async ({ request }) => {
    const pdf = await figureAsPdf(await readText(request, 'image/svg+xml', longestFigureBytes));
    return new Response(new Uint8Array(pdf), {
      headers: {
        'Content-Type': 'application/pdf',
        'Content-Disposition': 'attachment; filename="figure.pdf"',
      },
    });
  },
);
