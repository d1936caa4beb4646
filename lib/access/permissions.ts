import { AccessError, Conflict } from '@/lib/errors';
import type { Role } from '@/lib/schemas/common';
import type { Actor } from './actor';

/** yes: on everything; own: on what the person made; lead: on surveys that the person leads. */
export type Answer = 'yes' | 'own' | 'lead' | 'no';

interface Permission {
  /** Completes "You may …". */
  phrase: string;
  student: Answer;
  collaborator: Answer;
  statistician: Answer;
  author: Answer;
  owner: Answer;
  /** What a person who may not can do about it. */
  instead: string;
}

const row = (
  phrase: string,
  [student, collaborator, statistician, author, owner]: [Answer, Answer, Answer, Answer, Answer],
  instead: string,
): Permission => ({ phrase, student, collaborator, statistician, author, owner, instead });

/** The one permission table: screens, the API and the tests read it. */
export const permissions = {
  read: row(
    'read surveys, stars, maps, populations and analyses',
    ['yes', 'yes', 'yes', 'yes', 'yes'],
    'Ask an owner of the collaboration to invite you',
  ),
  'write-note': row(
    'write a note on what you may read',
    ['yes', 'yes', 'yes', 'yes', 'yes'],
    'Ask an owner of the collaboration to invite you',
  ),
  'copy-analysis': row(
    'copy an analysis to a draft of your own',
    ['yes', 'yes', 'yes', 'yes', 'yes'],
    'Ask an owner of the collaboration to invite you',
  ),
  'save-analysis': row(
    'save an analysis',
    ['own', 'own', 'yes', 'yes', 'yes'],
    'Copy the analysis and change the copy',
  ),
  'run-analysis': row(
    'run an analysis',
    ['own', 'own', 'yes', 'yes', 'yes'],
    'Copy the analysis and run the copy',
  ),
  'remove-analysis': row(
    'delete a draft analysis',
    ['own', 'own', 'yes', 'yes', 'yes'],
    'Ask the person who made it',
  ),
  'make-exercise': row(
    'set an exercise and read what everybody handed in',
    ['no', 'no', 'yes', 'yes', 'yes'],
    'Ask a statistician, an author or an owner to set it',
  ),
  'submit-exercise': row(
    'begin an exercise and hand in a run of your own',
    ['yes', 'yes', 'yes', 'yes', 'yes'],
    'Ask an owner of the collaboration to invite you',
  ),
  'create-survey': row(
    'create a survey and lead it',
    ['no', 'yes', 'no', 'no', 'yes'],
    'Ask an owner to create it',
  ),
  'change-survey': row(
    'change a survey',
    ['no', 'lead', 'no', 'no', 'yes'],
    'Ask the lead of the survey',
  ),
  'offer-survey': row(
    'offer a survey to another collaboration, and take it back',
    ['no', 'lead', 'no', 'no', 'yes'],
    'Ask the lead of the survey',
  ),
  'accept-survey': row(
    'accept a survey of another collaboration, or refuse it',
    ['no', 'yes', 'no', 'no', 'yes'],
    'Ask an owner or a collaborator',
  ),
  import: row(
    'import targets, curves, maps and companions',
    ['no', 'lead', 'no', 'no', 'yes'],
    'Ask the lead of the survey to import the file',
  ),
  'import-cooling-table': row(
    'import a cooling table for all',
    ['no', 'yes', 'yes', 'no', 'yes'],
    'Ask a statistician or a collaborator to import it',
  ),
  'save-sample': row(
    'save a version of a sample',
    ['own', 'own', 'yes', 'own', 'yes'],
    'Save it as a new sample of your own',
  ),
  combine: row(
    'resolve overlaps and combine surveys',
    ['no', 'yes', 'yes', 'no', 'yes'],
    'Ask a statistician',
  ),
  'adopt-values': row(
    'adopt ages and distances',
    ['no', 'lead', 'yes', 'no', 'yes'],
    'Ask a statistician, or the lead of a survey that lists the star',
  ),
  vet: row(
    'vet candidates',
    ['no', 'lead', 'no', 'no', 'yes'],
    'Send your verdict as a proposal: the lead of the survey decides',
  ),
  'save-population': row(
    'save a population version',
    ['own', 'own', 'yes', 'own', 'yes'],
    'Save it as a new population of your own',
  ),
  'share-population': row(
    'share a population with all',
    ['no', 'no', 'yes', 'no', 'yes'],
    'Save it as a draft of your own and ask a statistician to share it',
  ),
  'freeze-run': row(
    'freeze a run',
    ['no', 'no', 'no', 'yes', 'yes'],
    'Ask an author or an owner to freeze it',
  ),
  'sign-off-release': row(
    'sign a release off',
    ['no', 'no', 'yes', 'no', 'no'],
    'Ask a statistician to sign it off',
  ),
  'agree-release': row(
    'agree to a release that somebody else froze',
    ['no', 'no', 'no', 'yes', 'yes'],
    'Ask an author or an owner to agree',
  ),
  'withdraw-release': row(
    'withdraw a release',
    ['no', 'no', 'no', 'no', 'yes'],
    'Ask an owner to withdraw it',
  ),
  'deposit-release': row(
    'send a published release to an open repository',
    ['no', 'no', 'no', 'yes', 'yes'],
    'Ask an author or an owner to send it',
  ),
  'link-guest': row(
    'give a guest a link',
    ['no', 'no', 'no', 'yes', 'yes'],
    'Ask an author or an owner for a link',
  ),
  invite: row(
    'invite students',
    ['no', 'no', 'no', 'yes', 'yes'],
    'Ask an owner to invite the person',
  ),
  'invite-any-role': row(
    'invite people in any role',
    ['no', 'no', 'no', 'no', 'yes'],
    'Invite the person as a student, or ask an owner',
  ),
  'change-roles': row(
    'change roles and remove people',
    ['no', 'no', 'no', 'no', 'yes'],
    'Ask an owner',
  ),
  'watch-work': row(
    'watch the queue and the workers',
    ['no', 'no', 'no', 'no', 'yes'],
    'Ask an owner',
  ),
  'read-audit': row('read the log', ['no', 'no', 'no', 'no', 'yes'], 'Ask an owner'),
  'manage-collaboration': row(
    'rename, archive and delete the collaboration',
    ['no', 'no', 'no', 'no', 'yes'],
    'Ask an owner',
  ),
  'create-token': row(
    'make personal access tokens, never with more than your own roles',
    ['yes', 'yes', 'yes', 'yes', 'yes'],
    'Ask an owner of the collaboration to invite you',
  ),
} as const satisfies Record<string, Permission>;

export type Action = keyof typeof permissions;

/** How a thing stands to the person: made by them, or of a survey that they lead. */
export interface Standing {
  isOwn?: boolean;
  isLead?: boolean;
}

/** Roles in the order in which a sentence lists them. */
const ROLES: readonly Role[] = ['owner', 'author', 'statistician', 'collaborator', 'student'];

function covers(answer: Answer, item: Standing): boolean {
  if (answer === 'own') return item.isOwn === true;
  if (answer === 'lead') return item.isLead === true;
  return answer === 'yes';
}

/** What stays possible in an archived collaboration: reading, who may read, and opening it again. */
const OF_AN_ARCHIVE: ReadonlySet<Action> = new Set([
  'read',
  'read-audit',
  'watch-work',
  'change-roles',
  'create-token',
  'withdraw-release',
  'manage-collaboration',
]);

export const ARCHIVED =
  'This collaboration is archived, so nothing in it changes. An owner can open it again in its settings';

type WhoActs = Pick<Actor, 'roles' | 'isArchived'>;

const isShut = (actor: WhoActs, action: Action) =>
  actor.isArchived === true && !OF_AN_ARCHIVE.has(action);

/** Whether one of the actor's roles allows the action on this item; roles add up. */
export function may(actor: WhoActs, action: Action, item: Standing = {}): boolean {
  if (isShut(actor, action)) return false;
  return actor.roles.some((role) => covers(permissions[action][role], item));
}

/** Roles that allow the action on anything. */
export function rolesThatMay(action: Action): Role[] {
  return ROLES.filter((role) => permissions[action][role] === 'yes');
}

function listRoles(roles: readonly Role[]): string {
  const named = roles.map((role) => (/^[aeiou]/.test(role) ? `an ${role}` : `a ${role}`));
  if (named.length < 2) return named.join('');
  return `${named.slice(0, -1).join(', ')} or ${named[named.length - 1]}`;
}

/**
 * Refuses what the roles do not allow.
 *
 * @throws AccessError that names the roles which may, and what the person can do instead
 * @throws Conflict where the roles would do, but the collaboration is archived
 */
export function demand(actor: WhoActs, action: Action, item: Standing = {}): void {
  if (may(actor, action, item)) return;
  if (isShut(actor, action) && may({ roles: actor.roles }, action, item)) {
    throw new Conflict(ARCHIVED, 'archived');
  }
  const permission = permissions[action];
  const needed = rolesThatMay(action);
  const lead = ROLES.some((role) => (permission[role] as Answer) === 'lead');
  const who = [...(lead ? ['the lead of the survey'] : []), listRoles(needed)].join(', or ');
  throw new AccessError(
    `To ${permission.phrase} you need to be ${who}. ${permission.instead}.`,
    needed,
  );
}
