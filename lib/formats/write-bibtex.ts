/** Letters that plain BibTeX reads only as commands. */
const commands: Record<string, string> = { '&': '\\&', '%': '\\%', '#': '\\#' };

/**
 * One BibTeX entry.
 *
 * @param fields in order; text with braces and accents already as TeX has them
 */
export function writeBibtexEntry(
  type: 'article' | 'misc',
  key: string,
  fields: Readonly<Record<string, string>>,
): string {
  const lines = Object.entries(fields).map(([name, value]) => {
    const text = name === 'doi' ? value : value.replace(/[&%#]/g, (sign) => commands[sign]);
    return `  ${name} = {${text}}`;
  });
  return `@${type}{${key},\n${lines.join(',\n')}\n}\n`;
}
