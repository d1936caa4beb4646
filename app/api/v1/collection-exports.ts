import type { Actor } from '@/lib/access/actor';
import { exportQuerySchema } from '@/lib/schemas/exports';
import {
  type CollectionFiles,
  listCollectionFiles,
  writeCollectionFile,
} from '@/lib/services/exports/collection-files';
import { attachment } from './attachment';
import { collaborationRoute, type RouteHandler } from './handler';

type Open = (
  actor: Actor,
  params: Record<string, string>,
) => CollectionFiles | Promise<CollectionFiles>;

/** What something can be saved as. */
export const listFilesRoute = (open: Open): RouteHandler =>
  collaborationRoute({ scope: 'read' }, async ({ actor, params }) =>
    listCollectionFiles(await open(actor, params)),
  );

/** One of its files, as an attachment. */
export const fileRoute = (open: Open): RouteHandler =>
  collaborationRoute(
    { scope: 'read', query: exportQuerySchema },
    async ({ actor, params, query }) =>
      attachment(await writeCollectionFile(actor, await open(actor, params), params.file, query)),
  );
