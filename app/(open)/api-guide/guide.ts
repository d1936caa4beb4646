import { config } from '@/lib/config';
import { buildGuide, type GuideGroup } from '@/lib/schemas/api-guide';
import { buildOpenApi, type OpenApiDocument } from '@/lib/schemas/openapi';

let known: { document: OpenApiDocument; groups: GuideGroup[] } | undefined;

/** The description of this server's API, made once. */
export function apiGuide(): { document: OpenApiDocument; groups: GuideGroup[] } {
  if (!known) {
    const { origin } = new URL(config().webAddress);
    const document = buildOpenApi(origin);
    known = { document, groups: buildGuide(document, origin) };
  }
  return known;
}
