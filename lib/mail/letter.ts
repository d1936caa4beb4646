import { config } from '@/lib/config';

/** What every message is made of: one sentence, one link, who and why, how to stop it. */
export interface Letter {
  subject: string;
  sentence: string;
  link: { label: string; path: string };
  /** Further facts in a line each, such as how long a link works. */
  notes?: string[];
  why: string;
}

export interface LetterText {
  subject: string;
  text: string;
  html: string;
}

const escapeHtml = (text: string) =>
  text.replace(/[&<>"']/g, (sign) => `&#${sign.codePointAt(0)};`);

const inPage = 'font:400 16px/1.45 sans-serif;color:#0b2326;max-width:34em';

/**
 * The letter as plain text and as HTML with the same words.
 *
 * @param stop how to stop it: a sentence, with an address of this server where there is one
 */
export function writeLetter(letter: Letter, stop: { words: string; path?: string }): LetterText {
  const addressOf = (path: string) => new URL(path, config().webAddress).href;
  const address = addressOf(letter.link.path);
  const notes = letter.notes ?? [];
  const stopLine = stop.path === undefined ? stop.words : `${stop.words} ${addressOf(stop.path)}`;
  const text = [
    letter.sentence,
    `${letter.link.label}: ${address}`,
    ...notes,
    letter.why,
    stopLine,
    '',
  ].join('\n\n');
  const paragraph = (words: string) => `<p dir="auto">${escapeHtml(words)}</p>`;
  const stopHtml =
    stop.path === undefined
      ? paragraph(stop.words)
      : `<p><a href="${escapeHtml(addressOf(stop.path))}">${escapeHtml(stop.words.replace(/:$/, ''))}</a></p>`;
  const html = [
    '<!doctype html><html lang="en"><head><meta charset="utf-8">',
    `<title>${escapeHtml(letter.subject)}</title></head><body style="${inPage}">`,
    paragraph(letter.sentence),
    `<p><a href="${escapeHtml(address)}">${escapeHtml(letter.link.label)}</a></p>`,
    ...notes.map(paragraph),
    `<div style="color:#4a6164;font-size:14px">${paragraph(letter.why)}${stopHtml}</div>`,
    '</body></html>',
  ].join('\n');
  return { subject: letter.subject, text, html };
}
