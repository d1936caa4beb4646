import { escapeLatex } from '@/lib/formats/latex';
import type { LimitDocument } from './statement-document';

const originOf = ({ run, state }: LimitDocument): string => {
  if (state === 'live') return 'Live: this limit follows a control and no run records it.';
  if (run === null) return '';
  const digest = run.resultDigest === null ? '' : `, SHA-256 ${run.resultDigest}`;
  return `${run.analysis}, run ${run.number}, engine ${run.engineVersion}${digest}.`;
};

const sentences = (document: LimitDocument): string[] =>
  [
    `${document.sentence}.`,
    ...document.conditions.map(({ label, text }) => `${label}: ${text}.`),
    originOf(document),
  ].filter((line) => line !== '');

/**
 * A limit as text: the sentence, then a condition a line.
 *
 * @example limitAsText(document).split('\n')[0]
 * // '<5.8 % of stars host at least one planet of 2–30 MJ at 20–300 AU (95 %).'
 */
export function limitAsText(document: LimitDocument): string {
  return `${sentences(document).join('\n')}\n`;
}

/** Laws and the unit of mass, which are mathematics; everything else is text. */
const MATHEMATICS = /(dN\/d[Maq] ∝ [Maq]\^[−-]?[\d.]+|\b[Maq]\^[−-]?[\d.]+|\bMJ\b)/;

function asMathematics(part: string): string {
  if (part === 'MJ') return '$M_{\\mathrm{J}}$';
  const tex = part
    .replace('∝', '\\propto')
    .replace(/\^[−-]?[\d.]+/, (power) => `^{${power.slice(1).replace('−', '-')}}`);
  return `$${tex}$`;
}

const asLatex = (text: string): string =>
  text
    .split(MATHEMATICS)
    .map((part, at) => (at % 2 === 1 ? asMathematics(part) : escapeLatex(part)))
    .join('');

/**
 * A limit as a paragraph of LaTeX; names of surveys, stars and populations are escaped.
 *
 * @example limitAsLatex(document).startsWith('$<$5.8\\,\\% of stars') // true
 */
export function limitAsLatex(document: LimitDocument): string {
  return `${sentences(document).map(asLatex).join('\n')}\n`;
}

/** A limit as JSON, as limitStatementSchema reads it. */
export function limitAsJson(document: LimitDocument): string {
  return `${JSON.stringify(document, null, 2)}\n`;
}
