import { nearestTo } from './headings';
import type { KnownTarget } from './kinds';
import { uploadLimits } from './limits';
import { codePoint, quoteFound } from './reports';

/** What is wrong with a text cell, as the rest of a fault. */
export interface TextProblem {
  code: 'name-start' | 'control-character' | 'too-long';
  found: string;
  expected: string;
  hint?: string;
}

const control = /\p{Cc}/u;
const controlInProse = /[^\P{Cc}\t\n\r]/u;
const direction = /[\u061c\u200b\u200e\u200f\u2028-\u202e\u2066-\u2069\ufeff]/u;

/** Controls and marks that change how text reads; line breaks and tabs are fine in prose. */
export function findControl(text: string, isProse: boolean): TextProblem | null {
  const found = (isProse ? controlInProse : control).exec(text)?.[0];
  const mark = found === undefined ? direction.exec(text)?.[0] : undefined;
  if (found === undefined && mark === undefined) return null;
  return {
    code: 'control-character',
    found: found
      ? `the control character ${codePoint(found)}`
      : `the direction mark ${codePoint(mark ?? '')}`,
    expected: 'printable text',
  };
}

/**
 * The rule for names and every other short text: a spreadsheet would run a cell that starts with
 * = + - or @, so none may.
 */
export function findNameProblem(text: string, what: string, most: number): TextProblem | null {
  const hidden = findControl(text, false);
  if (hidden !== null) return hidden;
  if (/^[=+\-@]/.test(text)) {
    return {
      code: 'name-start',
      found: quoteFound(text),
      expected: `${what} that does not start with = + - or @`,
      ...(/^-+$/.test(text) ? { hint: 'Leave the cell empty where there is none' } : {}),
    };
  }
  const length = text.length > most ? Array.from(text).length : text.length;
  if (length > most) {
    return { code: 'too-long', found: `${length} characters`, expected: `at most ${most}` };
  }
  return null;
}

export function findTargetNameProblem(name: string): TextProblem | null {
  return findNameProblem(name, 'a name', uploadLimits.nameCharacters);
}

/** Two names are one target when they agree without regard to case and spaces. */
export function foldName(name: string): string {
  return name.normalize('NFKC').toLowerCase().replace(/\s+/gu, '');
}

/** Finds the survey's target that a file means by a name. */
export class TargetBook {
  private readonly byFold = new Map<string, string>();
  private readonly asWritten = new Map<string, string | null>();

  constructor(private readonly known: KnownTarget[] | undefined) {
    for (const target of known ?? []) {
      this.note(target.name, target.name);
      for (const other of target.otherNames) this.note(other, target.name);
    }
  }

  /**
   * The target's own name; without a list of targets the first spelling met. Null where the
   * survey has no such target.
   */
  find(written: string): string | null {
    const cached = this.asWritten.get(written);
    if (cached !== undefined) return cached;
    const fold = foldName(written);
    if (this.known === undefined) this.note(written, written);
    const found = this.byFold.get(fold) ?? null;
    this.asWritten.set(written, found);
    return found;
  }

  suggest(written: string): string | null {
    const names = (this.known ?? []).flatMap((target) => [target.name, ...target.otherNames]);
    return nearestTo(written, names);
  }

  private note(name: string, target: string): void {
    const fold = foldName(name);
    if (!this.byFold.has(fold)) this.byFold.set(fold, target);
  }
}
