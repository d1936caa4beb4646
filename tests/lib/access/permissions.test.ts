import { describe, expect, it } from 'vitest';
import { type Action, demand, may, permissions, rolesThatMay } from '@/lib/access/permissions';
import { AccessError } from '@/lib/errors';
import { type Role, roleSchema } from '@/lib/schemas/common';

const actor = (...roles: Role[]) => ({ roles });
const actions = Object.keys(permissions) as Action[];

describe('may(actor, action, item)', () => {
  it.each(actions)('%s follows the table for every role', (action) => {
    for (const role of roleSchema.options) {
      const answer = permissions[action][role];
      expect(may(actor(role), action)).toBe(answer === 'yes');
      expect(may(actor(role), action, { isOwn: true })).toBe(answer === 'yes' || answer === 'own');
      expect(may(actor(role), action, { isLead: true })).toBe(
        answer === 'yes' || answer === 'lead',
      );
    }
  });

  it('adds the roles of a person up', () => {
    expect(may(actor('student'), 'combine')).toBe(false);
    expect(may(actor('student', 'statistician'), 'combine')).toBe(true);
    expect(may(actor('author', 'collaborator'), 'import', { isLead: true })).toBe(true);
    expect(may(actor('author', 'collaborator'), 'import')).toBe(false);
  });

  it('gives nothing to a person without roles', () => {
    for (const action of actions) {
      expect(may(actor(), action, { isOwn: true, isLead: true })).toBe(false);
    }
  });

  it('gives an owner everything but the sign-off, which is a second pair of eyes', () => {
    const refused = actions.filter((action) => !may(actor('owner'), action));
    expect(refused).toEqual(['sign-off-release']);
    expect(may(actor('statistician'), 'sign-off-release')).toBe(true);
  });
});

describe('demand(actor, action, item)', () => {
  it('names the roles that are missing and what can be done instead', () => {
    const refused = () => demand(actor('student'), 'share-population');
    expect(refused).toThrow(AccessError);
    expect(refused).toThrow(
      'To share a population with all you need to be an owner or a statistician. ' +
        'Save it as a draft of your own and ask a statistician to share it.',
    );
    try {
      refused();
    } catch (error) {
      expect((error as AccessError).needed).toEqual(['owner', 'statistician']);
      expect((error as AccessError).status).toBe(403);
    }
  });

  it('names the lead of the survey where a lead may', () => {
    expect(() => demand(actor('collaborator'), 'import')).toThrow(
      'you need to be the lead of the survey, or an owner',
    );
  });

  it('lets pass what the table allows', () => {
    expect(() => demand(actor('collaborator'), 'import', { isLead: true })).not.toThrow();
    expect(() => demand(actor('student'), 'save-analysis', { isOwn: true })).not.toThrow();
  });
});

describe('the table', () => {
  it('keeps at least one role for each action', () => {
    for (const action of actions) expect(rolesThatMay(action)).not.toEqual([]);
  });

  it('lets a student do nothing to what others made', () => {
    const allowed = actions.filter((action) => may(actor('student'), action));
    expect(allowed).toEqual([
      'read',
      'write-note',
      'copy-analysis',
      'submit-exercise',
      'create-token',
    ]);
  });
});
