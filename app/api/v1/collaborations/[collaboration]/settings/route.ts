import { collaborationRoute } from '@/app/api/v1/handler';
import { changeSettingsSchema } from '@/lib/schemas/settings';
import { changeSettings, getSettings } from '@/lib/services/settings';

export const GET = collaborationRoute({ scope: 'read' }, ({ actor }) => getSettings(actor));

export const PATCH = collaborationRoute(
  { scope: 'write', body: changeSettingsSchema, current: ({ actor }) => getSettings(actor) },
  ({ actor, body }) => changeSettings(actor, body),
);
