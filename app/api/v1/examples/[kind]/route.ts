import { openRoute } from '@/app/api/v1/handler';
import { exampleFile } from '@/lib/services/example-files';

/** A small file of invented data for each kind of upload. */
export const GET = openRoute({}, async ({ params }) => {
  const { fileName, text } = exampleFile(params.kind);
  return new Response(text, {
    headers: {
      'Content-Type': 'text/csv; charset=utf-8',
      'Content-Disposition': `attachment; filename="${fileName}"`,
    },
  });
});
