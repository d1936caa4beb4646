/** Groups of the help, in the order of its contents page. */
export const helpGroups = {
  inputs: 'Stars, surveys and their files',
  sensitivity: 'What could have been seen',
  population: 'Which planets are asked about',
  inference: 'From counts to a limit',
  checks: 'What the limit rests on',
  records: 'Analyses, runs and what becomes of them',
} as const;
export type HelpGroup = keyof typeof helpGroups;

export interface HelpFormula {
  /** LaTeX, set by KaTeX on the server. */
  tex: string;
  /** The same for somebody who hears it, with what each letter means. */
  reads: string;
}

export interface HelpEntry {
  title: string;
  group: HelpGroup;
  /** A quantity has a formula; a thing has none where none would say more than the words. */
  kind: 'quantity' | 'thing';
  /** One paragraph; formulas in it stand between dollar signs. */
  definition: string;
  formulas: readonly HelpFormula[];
  units: string;
  source: string;
  /** Name of a drawing of ./figures. */
  figure?: string;
  seeAlso: readonly string[];
}

/** Keeps the names of a group's words, so that a mark can only name a word that exists. */
export const entries = <Word extends string>(
  group: HelpGroup,
  words: Record<Word, Omit<HelpEntry, 'group'>>,
): Record<Word, HelpEntry> => {
  const grouped = {} as Record<Word, HelpEntry>;
  for (const word of Object.keys(words) as Word[]) grouped[word] = { group, ...words[word] };
  return grouped;
};
