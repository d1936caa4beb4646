export interface Nameable {
  id: string;
  name: string;
}

/** What is typed behind the @ before the cursor. */
export interface MentionQuery {
  /** Of the @ in the text. */
  start: number;
  typed: string;
}

const LONGEST_QUERY = 40;
const MOST_SUGGESTIONS = 6;

/** The name being typed at the cursor, or null: an @ begins one behind a space or an opening sign. */
export function mentionAt(text: string, cursor: number): MentionQuery | null {
  const before = text.slice(0, cursor);
  const start = before.lastIndexOf('@');
  if (start < 0 || (start > 0 && !/[\s([{"'“‘,;:]/.test(before[start - 1]))) return null;
  const typed = before.slice(start + 1);
  return typed.length > LONGEST_QUERY || /[\n@]/.test(typed) ? null : { start, typed };
}

const folded = (text: string) => text.normalize('NFKD').replace(/\p{M}/gu, '').toLowerCase();

/** People any of whose names begins with what is typed. */
export function suggestPeople(people: readonly Nameable[], typed: string): Nameable[] {
  const wanted = folded(typed);
  return people
    .filter(({ name }) => {
      const own = folded(name);
      return own.startsWith(wanted) || own.split(/[\s-]+/).some((part) => part.startsWith(wanted));
    })
    .slice(0, MOST_SUGGESTIONS);
}

/** The text with the name in place of what was typed, and where the cursor goes. */
export function putMention(
  text: string,
  { start, typed }: MentionQuery,
  name: string,
): { text: string; cursor: number } {
  const rest = text.slice(start + 1 + typed.length);
  const gap = /^\s/.test(rest) ? '' : ' ';
  return { text: `${text.slice(0, start)}@${name}${gap}${rest}`, cursor: start + name.length + 2 };
}

const longestFirst = (a: Nameable, b: Nameable) => b.name.length - a.name.length;

/** Text in pieces; a piece that names somebody says whom. */
export function splitMentions(
  text: string,
  people: readonly Nameable[],
): { text: string; person?: Nameable }[] {
  const sorted = [...people].sort(longestFirst);
  const pieces: { text: string; person?: Nameable }[] = [];
  let plain = '';
  for (let at = 0; at < text.length; ) {
    const person =
      text[at] === '@'
        ? sorted.find(({ name }) => name !== '' && text.startsWith(name, at + 1))
        : undefined;
    if (!person) {
      plain += text[at];
      at += 1;
      continue;
    }
    if (plain !== '') pieces.push({ text: plain });
    plain = '';
    pieces.push({ text: `@${person.name}`, person });
    at += person.name.length + 1;
  }
  if (plain !== '') pieces.push({ text: plain });
  return pieces;
}

/**
 * Whom a text names. Of two people with one name it is the one that was picked.
 *
 * @param picked ids of the people chosen from the suggestions
 */
export function mentionedIn(
  text: string,
  people: readonly Nameable[],
  picked: ReadonlySet<string>,
): string[] {
  const preferred = [...people].sort((a, b) => Number(picked.has(b.id)) - Number(picked.has(a.id)));
  const named = splitMentions(text, preferred).flatMap(({ person }) => (person ? [person.id] : []));
  return [...new Set(named)];
}
