import { checkWords } from './checks';
import { inferenceWords } from './inference';
import { inputWords } from './inputs';
import { populationWords } from './population';
import { recordWords } from './records';
import { sensitivityWords } from './sensitivity';
import type { HelpEntry } from './types';

const words = {
  ...inputWords,
  ...sensitivityWords,
  ...populationWords,
  ...inferenceWords,
  ...checkWords,
  ...recordWords,
};

/** A word that has an entry: marks name no other. */
export type HelpWord = keyof typeof words;

/** Everything that the help explains, by the word in its address. */
export const helpWords: Readonly<Record<HelpWord, HelpEntry>> = words;

export const helpWordNames = Object.keys(words) as HelpWord[];

export function isHelpWord(text: string): text is HelpWord {
  return Object.hasOwn(words, text);
}

export type { HelpAxis, HelpCurve, HelpDrawing } from './drawing';
export { helpDrawing } from './figures';
export { type HelpEntry, type HelpFormula, type HelpGroup, helpGroups } from './types';
