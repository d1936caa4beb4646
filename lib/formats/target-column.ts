import type { ReadContext } from './kinds';
import { findTargetNameProblem, TargetBook } from './names';
import { type Cell, refused, type TableReading } from './reading';
import { quoteFound } from './reports';

/**
 * The `target` column of a file that speaks of a survey's stars. A file without one belongs to the
 * star that the form names. Each name is judged once, however many rows carry it.
 */
export class TargetColumn {
  private readonly book: TargetBook;
  private readonly judged = new Map<string, string | typeof refused>();
  private readonly defaultTarget: string | null;
  /** A search through all names for each unknown one would let a long file of strangers run for hours. */
  private suggestionsLeft = 5;

  constructor(
    private readonly reading: TableReading,
    context: ReadContext,
  ) {
    this.book = new TargetBook(context.targetNames);
    const chosen = context.defaultTarget?.trim();
    this.defaultTarget = chosen === undefined || chosen === '' ? null : chosen;
  }

  /** Reports a file that names no star and was given none; true where rows can be read. */
  check(): boolean {
    if (this.reading.has('target')) return true;
    if (this.defaultTarget === null) {
      this.reading.fault(this.reading.table.headingPlace, {
        code: 'column-missing',
        message: 'column "target" is missing',
        hint: 'Add it, or choose on the form the star that the file belongs to',
      });
      return false;
    }
    const message = `The file names no target; all rows belong to ${quoteFound(this.defaultTarget)}`;
    this.reading.notes.inform('default-used', message, this.reading.table.headingPlace);
    return true;
  }

  read(row: number): Cell<string> {
    const written = this.reading.has('target')
      ? this.reading.raw('target', row)
      : this.defaultTarget;
    if (written === null) {
      this.reading.missing('target', row, 'a target name');
      return refused;
    }
    if (this.judged.has(written)) return this.judged.get(written);
    const target = this.judge(written, row);
    this.judged.set(written, target);
    return target;
  }

  private judge(written: string, row: number): string | typeof refused {
    const place = this.reading.has('target') ? this.reading.place(row, 'target') : {};
    const problem = findTargetNameProblem(written);
    if (problem !== null) {
      this.reading.fault(place, problem);
      return refused;
    }
    const target = this.book.find(written);
    if (target !== null) return target;
    const near = this.suggestionsLeft > 0 ? this.book.suggest(written) : null;
    this.suggestionsLeft -= 1;
    this.reading.fault(place, {
      code: 'target-unknown',
      message: `${quoteFound(written)} is not a target of this survey`,
      hint: `${near === null ? '' : `Did you mean ${quoteFound(near)}? `}Add it first, or give it as another name`,
    });
    return refused;
  }
}
