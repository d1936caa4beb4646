import type { HelpDefinition } from '@/lib/schemas/help';
import { type HelpWord, helpWords } from '.';
import { typesetFormula, typesetParagraph } from './typeset';

/** An entry with its formulas set, for pages and for the marks beside quantities. */
export function helpDefinition(word: HelpWord): HelpDefinition {
  const { title, definition, formulas, units, source, seeAlso } = helpWords[word];
  return {
    word,
    title,
    paragraph: typesetParagraph(definition),
    formulas: formulas.map(({ tex, reads }) => ({ html: typesetFormula(tex), reads })),
    units,
    source,
    seeAlso: seeAlso.map((other) => ({ word: other, title: helpWords[other as HelpWord].title })),
  };
}
