import type { Actor } from '@/lib/access/actor';
import { type Action, may } from '@/lib/access/permissions';
import type { ActivityKind } from '@/lib/schemas/activity';

/** Actions of the log that are news, by the kind under which a reader looks for them. */
const newsOf: Record<ActivityKind, readonly string[]> = {
  surveys: ['create-survey', 'change-survey', 'import', 'import-cooling-table'],
  stars: ['combine', 'adopt-values', 'save-sample'],
  candidates: ['vet'],
  analyses: [
    'save-population',
    'share-population',
    'save-analysis',
    'copy-analysis',
    'run-analysis',
    'remove-analysis',
    'import-bundle',
    'finish-run',
  ],
  notes: ['write-note', 'settle-note'],
  releases: [
    'freeze-run',
    'save-release',
    'sign-off-release',
    'agree-release',
    'publish-release',
    'withdraw-release',
    'deposit-release',
    'link-guest',
  ],
  people: [
    'create-collaboration',
    'rename',
    'change-settings',
    'delete-collaboration',
    'join',
    'invite',
    'resend-invitation',
    'revoke-invitation',
    'change-roles',
    'remove-member',
    'suspend-member',
    'resume-member',
  ],
};

/** News that only some may read; the rest is work on the science, which every member may read. */
const guarded: Record<string, Action> = {
  invite: 'invite',
  'resend-invitation': 'invite',
  'revoke-invitation': 'invite',
  'change-roles': 'change-roles',
  'remove-member': 'change-roles',
  'suspend-member': 'change-roles',
  'resume-member': 'change-roles',
  'change-settings': 'manage-collaboration',
  'link-guest': 'link-guest',
};

const kindOfAction = new Map(
  Object.entries(newsOf).flatMap(([kind, actions]) =>
    actions.map((action) => [action, kind as ActivityKind] as const),
  ),
);

export const kindOf = (action: string): ActivityKind => kindOfAction.get(action) ?? 'surveys';

/** Actions that the actor may read news of. */
export function newsFor(actor: Pick<Actor, 'roles'>, kind?: ActivityKind): string[] {
  const actions = kind === undefined ? [...kindOfAction.keys()] : [...newsOf[kind]];
  // An archive keeps its readers: what they may read follows from their roles alone.
  const reader = { roles: actor.roles };
  return actions.filter((action) => {
    const needed = guarded[action];
    return needed === undefined || may(reader, needed);
  });
}
