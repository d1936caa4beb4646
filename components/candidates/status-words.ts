import type { StateKind } from '@/components/ui/state-mark';
import type { CompanionStatus } from '@/lib/schemas/candidates';

/** The words of the screens; `confirmed` is the word of files and of the API. */
export const statusWords: Record<CompanionStatus, string> = {
  confirmed: 'companion',
  candidate: 'candidate',
  ambiguous: 'ambiguous',
  background: 'background',
};

export const statuses = Object.keys(statusWords) as CompanionStatus[];

/** Undefined for anything that is no status. */
export const readStatus = (value: unknown) => statuses.find((status) => status === value);

export const statusMarks: Record<CompanionStatus, StateKind> = {
  confirmed: 'ok',
  candidate: 'warn',
  ambiguous: 'warn',
  background: 'stopped',
};

const origins: Record<string, string> = {
  file: 'as the file states it',
  given: 'given by hand',
  photometry: 'from photometry',
  separation: 'from the projected separation',
};

/** How a mass or an axis came about. */
export const originWords = (from: string | null) => (from === null ? '' : (origins[from] ?? from));
