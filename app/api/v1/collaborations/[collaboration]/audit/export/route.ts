import { collaborationRoute } from '@/app/api/v1/handler';
import { auditExportQuerySchema } from '@/lib/schemas/audit';
import { exportAudit } from '@/lib/services/audit';

/** The log as a file, as an attachment. */
export const GET = collaborationRoute(
  { scope: 'read', query: auditExportQuerySchema },
  async ({ actor, query }) => {
    const { fileName, contentType, text } = await exportAudit(actor, query);
    return new Response(text, {
      headers: {
        'Content-Type': contentType,
        'Content-Disposition': `attachment; filename="${fileName}"`,
      },
    });
  },
);
