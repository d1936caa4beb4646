import katex from 'katex';

/** A formula that somebody may not have closed or misspelt must not reach a page: strict, and it throws. */
const settings = { output: 'htmlAndMathml', strict: 'error', throwOnError: true } as const;

/**
 * A formula as HTML for the eye and MathML for readers.
 *
 * @throws Error that KaTeX gives for a formula it cannot set
 */
export function typesetFormula(tex: string): string {
  return katex.renderToString(tex, { ...settings, displayMode: true });
}

export interface TypesetPart {
  text: string;
  /** Set for a formula: what stands in the text's place. */
  html?: string;
}

/**
 * A paragraph with formulas between dollar signs, cut into its parts.
 *
 * @throws RangeError for a formula that is not closed, and as typesetFormula
 */
export function typesetParagraph(text: string): TypesetPart[] {
  const parts = text.split('$');
  if (parts.length % 2 === 0) throw new RangeError(`a formula is not closed in "${text}"`);
  return parts
    .map((part, at) =>
      at % 2 === 0 ? { text: part } : { text: part, html: katex.renderToString(part, settings) },
    )
    .filter((part) => part.text !== '');
}
