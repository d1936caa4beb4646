import type { Fault } from '@/lib/errors';
import type { Note } from './kinds';
import type { Place } from './table';

/** Entries of one code that are listed; the rest are counted. */
const listedPerCode = 5;
const quotedCharacters = 40;
/** Faults that are kept for the rows at fault, beyond those that are listed. */
const keptFaults = 10_000;

const unseen = /[\p{Cc}\u061c\u200b\u200e\u200f\u2028-\u202e\u2066-\u2069\ufeff]/gu;

export function codePoint(character: string): string {
  return `U+${(character.codePointAt(0) ?? 0).toString(16).toUpperCase().padStart(4, '0')}`;
}

/** What was found, fit to print: at most 40 characters, controls as U+xxxx. */
export function quoteFound(text: string): string {
  const characters = Array.from(text.slice(0, 4 * quotedCharacters));
  const isCut = characters.length > quotedCharacters || text.length > 4 * quotedCharacters;
  const shown = characters.slice(0, quotedCharacters).join('');
  return `"${showUnseen(shown)}${isCut ? '…' : ''}"`;
}

/** Controls and characters that turn the direction of a text, as U+xxxx. */
export function showUnseen(text: string): string {
  return text.replace(unseen, (character) => codePoint(character));
}

/** The place of a fault or note in words: `line 3, column "ra"`, or `file` for the whole of it. */
export function placeOf(entry: Place): string {
  const parts = [
    entry.line === undefined ? '' : `line ${entry.line}`,
    entry.item ?? '',
    entry.row === undefined ? '' : `row ${entry.row}`,
    entry.column === undefined ? '' : `column "${entry.column}"`,
  ].filter(Boolean);
  return parts.length === 0 ? 'file' : parts.join(', ');
}

class Report<Entry extends { code: string }> {
  count = 0;
  private readonly listed: Entry[] = [];
  private readonly perCode = new Map<string, number>();

  add(entry: Entry): void {
    const before = this.perCode.get(entry.code) ?? 0;
    this.count += 1;
    this.perCode.set(entry.code, before + 1);
    if (before < listedPerCode) this.listed.push(entry);
  }

  /** The listed entries, then one line for each code that has more. */
  protected listWith(more: (code: string, message: string) => Entry): Entry[] {
    const rest: Entry[] = [];
    for (const [code, count] of this.perCode) {
      if (count > listedPerCode) rest.push(more(code, `and ${count - listedPerCode} more like it`));
    }
    return [...this.listed, ...rest];
  }
}

export class FaultReport extends Report<Fault> {
  /** In the order of the file, each of them. */
  readonly kept: Fault[] = [];

  override add(fault: Fault): void {
    super.add(fault);
    if (this.kept.length < keptFaults) this.kept.push(fault);
  }

  list(fileName: string): Fault[] {
    return this.listWith((code, message) => ({ code, message })).map((fault) => ({
      ...fault,
      file: fileName,
    }));
  }
}

export class NoteReport extends Report<Note> {
  private readonly levels = new Map<string, Note['level']>();

  inform(code: string, message: string, place: Place = {}): void {
    this.write('information', code, message, place);
  }

  warn(code: string, message: string, place: Place = {}): void {
    this.write('warning', code, message, place);
  }

  list(): Note[] {
    return this.listWith((code, message) => ({
      code,
      level: this.levels.get(code) ?? 'information',
      message,
    }));
  }

  private write(level: Note['level'], code: string, message: string, place: Place): void {
    if (this.levels.get(code) !== 'warning') this.levels.set(code, level);
    const { row, item, ...rest } = place;
    const where = [item ?? '', row === undefined ? '' : `row ${row}`].filter(Boolean).join(', ');
    this.add({ code, level, ...rest, ...(where ? { item: where } : {}), message });
  }
}
