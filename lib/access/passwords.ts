import { hash, verify } from '@node-rs/argon2';
import { ZxcvbnFactory } from '@zxcvbn-ts/core';
import { adjacencyGraphs, dictionary } from '@zxcvbn-ts/language-common';
import { InputError } from '@/lib/errors';

const SHORTEST = 15;
const SHORTEST_WITH_FACTOR = 8;
const LONGEST = 128;
const LOWEST_SCORE = 3;
/** No eight characters reach 3, random ones neither: this one counts ten guesses for each. */
const LOWEST_SCORE_WITH_FACTOR = 2;
/** A shorter part of a name stands in too many innocent words. */
const SHORTEST_NAME_PART = 4;

/** argon2id is the package's own choice; 19 MiB and two passes are OWASP's first advice. */
const COST = { memoryCost: 19 * 1024, timeCost: 2, parallelism: 1 };

/** One form for what looks the same on another keyboard; nothing is cut. */
const normalised = (password: string) => password.normalize('NFKC');

export interface Owner {
  name: string;
  email: string;
}

const folded = (text: string) => text.normalize('NFKD').replace(/\p{M}/gu, '').toLowerCase();

/** Words that somebody who knows the person would try first. */
function namesOf(owner: Owner): string[] {
  const [local, domain = ''] = owner.email.split('@');
  const words = [...owner.name.split(/[\s.'’-]+/), ...local.split(/[._+-]+/), domain.split('.')[0]];
  return ['rarebound', owner.name.replace(/\s+/g, ''), local, ...words]
    .map(folded)
    .filter((word) => word.length >= SHORTEST_NAME_PART);
}

let strength: ZxcvbnFactory | undefined;
function scoreOf(password: string, names: string[]): number {
  strength ??= new ZxcvbnFactory({ dictionary, graphs: adjacencyGraphs, maxLength: LONGEST });
  return strength.check(password, names).score;
}

/** Whether the password is long enough where no second factor stands beside it. */
export const isLongAlone = (password: string): boolean =>
  [...normalised(password)].length >= SHORTEST;

/** Why a password is refused, or null; beside a second factor it may be shorter. */
export function passwordFault(
  password: string,
  owner: Owner,
  hasSecondFactor = false,
): { code: string; message: string } | null {
  const given = normalised(password);
  const length = [...given].length;
  const shortest = hasSecondFactor ? SHORTEST_WITH_FACTOR : SHORTEST;
  if (length < shortest) {
    return {
      code: 'too-short',
      message: `found ${length} characters; expected at least ${shortest}`,
    };
  }
  if (length > LONGEST) {
    return { code: 'too-long', message: `found ${length} characters; expected at most ${LONGEST}` };
  }
  const names = namesOf(owner);
  const squeezed = folded(given).replace(/[\s._-]+/g, '');
  if (names.some((name) => folded(given).includes(name) || squeezed.includes(name))) {
    return {
      code: 'password-name',
      message: 'it holds your name, your address or the name of this product; choose other words',
    };
  }
  const lowest = hasSecondFactor ? LOWEST_SCORE_WITH_FACTOR : LOWEST_SCORE;
  if (scoreOf(given, names) < lowest) {
    return {
      code: 'password-guessable',
      message:
        'it is made of common words, repeats or runs; four or five unrelated words are better',
    };
  }
  return null;
}

/** @throws InputError when the password is too short, too long, guessable or named after its owner */
export function checkPassword(password: string, owner: Owner, hasSecondFactor = false): void {
  const fault = passwordFault(password, owner, hasSecondFactor);
  if (fault) throw new InputError({ item: 'password', ...fault });
}

/** argon2id hash of the whole password with a salt of its own. */
export function hashPassword(password: string): Promise<string> {
  return hash(normalised(password), COST);
}

let nobodysHash: Promise<string> | undefined;

/**
 * Whether the password is the one that was hashed.
 *
 * @param stored null for an account that does not exist: the same work is done, the answer is no
 */
export async function isPassword(password: string, stored: string | null): Promise<boolean> {
  nobodysHash ??= hashPassword('nobody signs in with this one');
  const isRight = await verify(stored ?? (await nobodysHash), normalised(password));
  return isRight && stored !== null;
}
