import { personRoute } from '@/app/api/v1/handler';
import { changeMailPreferenceSchema } from '@/lib/schemas/mail';
import { changeMailPreference, getMailPreferences } from '@/lib/services/mail';

export const GET = personRoute({ scope: 'read', sessionOnly: true }, ({ person }) =>
  getMailPreferences(person),
);

export const PATCH = personRoute(
  {
    scope: 'write',
    sessionOnly: true,
    body: changeMailPreferenceSchema,
    current: ({ person }) => getMailPreferences(person),
  },
  ({ person, body }) => changeMailPreference(person, body),
);
