/**
 * Text for containers that hold ASCII alone: accents are dropped, other signs become `?`, and what
 * moves the cursor becomes a space.
 *
 * @example asciiText('Lafrenière ⊙') // 'Lafreniere ?'
 */
export function asciiText(text: string): string {
  return text
    .normalize('NFKD')
    .replace(/\p{Mn}/gu, '')
    .replace(/[\t\n\r]+/g, ' ')
    .replace(/[^\x20-\x7e]/gu, '?');
}

const words: Record<string, string> = {
  '–': '-',
  '−': '-',
  '±': '+/-',
  '×': 'x',
  '∝': '~',
  α: 'alpha',
  β: 'beta',
  σ: 'sigma',
  '’': "'",
  Ĉ: 'C',
};

/** The same for sentences of ours, whose signs have words. */
export function asciiProse(text: string): string {
  return asciiText(text.replace(/[–−±×∝αβσ’Ĉ]/g, (sign) => words[sign]));
}
