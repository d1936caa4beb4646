import type { Transaction } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import type { Fault } from '@/lib/errors';
import type { Note } from '@/lib/formats';
import type { UploadReport } from '@/lib/schemas/uploads';
import type { SurveyRow } from '@/models';

export type PlannedItem = UploadReport['items'][number];

/**
 * What storing a file would do. The dry run shows it; storing makes it anew and then applies it, so
 * that both go through the same code.
 */
export interface Plan {
  items: PlannedItem[];
  faults: Fault[];
  notes: Note[];
  summary: string;
  /** Writes everything, inside the caller's transaction. */
  apply(transaction: Transaction, uploadId: string): Promise<void>;
  /** True when completeness maps have to be computed afterwards. */
  needsMaps: boolean;
}

export interface PlanContext {
  actor: Actor;
  survey: SurveyRow;
}

/** "1 target", "94 targets". */
export const countOf = (count: number, noun: string) => `${count} ${noun}${count === 1 ? '' : 's'}`;

/** "94 new, 2 of known stars, 1 unchanged": the outcomes of a plan in words. */
export function summariseItems(items: PlannedItem[], noun: string): string {
  const words: [PlannedItem['outcome'], string][] = [
    ['new', 'new'],
    ['known-star', 'of known stars'],
    ['replaces', 'replaced'],
    ['unchanged', 'unchanged'],
    ['left-out', 'left out'],
  ];
  const parts = words.flatMap(([outcome, word]) => {
    const count = items.filter((item) => item.outcome === outcome).length;
    return count === 0 ? [] : [`${count} ${word}`];
  });
  return `${countOf(items.length, noun)}: ${parts.join(', ') || 'nothing'}`;
}

/** Rows of one statement: thousands one by one would hold the process up for many seconds. */
const ROWS_AT_ONCE = 500;

/** Writes many rows in statements of a bearable length. */
export async function inParts<Item>(
  items: Item[],
  write: (part: Item[]) => Promise<unknown>,
): Promise<void> {
  for (let from = 0; from < items.length; from += ROWS_AT_ONCE) {
    await write(items.slice(from, from + ROWS_AT_ONCE));
  }
}
