import { formatPlain, formatSignificant } from '@/lib/quantities/display';
import type { AdoptionPreview } from '@/lib/schemas/stars';

const DIGITS = 3;

const limitWords = (limit: number, isFraction: boolean) =>
  isFraction
    ? `<${formatSignificant(100 * limit, DIGITS)}\u2009%`
    : `<${formatSignificant(limit, DIGITS)}`;

/** How the lead limit would move, as a sentence. */
export function previewWords(preview: AdoptionPreview): string {
  const { lead, level, stars, before, after, missing, isFraction } = preview;
  if (lead === null || before === null) return `${missing}.`;
  const analysis = `${lead.key}, run ${lead.run}`;
  if (stars === 0)
    return `No star of the lead analysis (${analysis}) is concerned: its limit stays.`;
  if (after === null)
    return `How the limit of ${analysis} would move is not computed here. ${missing}.`;
  const credible = level === null ? '' : ` (${formatPlain(100 * level)}\u2009%)`;
  const count = stars === 1 ? '1 of its stars is' : `${stars} of its stars are`;
  const from = limitWords(before, isFraction);
  const to = limitWords(after, isFraction);
  const change = 100 * (after / before - 1);
  const moved =
    from === to
      ? `stays at ${from}${credible}`
      : `would move from ${from} to ${to}${credible}, by ${change > 0 ? '+' : '−'}${formatSignificant(Math.abs(change), 2)}\u2009%`;
  return `The limit of the lead analysis ${analysis} ${moved}: ${count} mapped anew, all others as in that run.`;
}
