import { readNumberText } from './numbers';
import type { FaultReport, NoteReport } from './reports';
import type { Place, RawCell } from './table';

/** Values this close to 0 or 1 are rounding of a table, not errors. */
const roundingTolerance = 1e-6;

type Where = () => Place;

interface Tally {
  first: Place;
  found: string;
  count: number;
}

/**
 * Reads completeness values one by one and reports what is wrong with all of them together: the
 * first place and the count.
 */
export class CompletenessValues {
  private outside: (Tally & { farthest: number }) | null = null;
  private notFinite: Tally | null = null;
  private rounded = 0;
  private unmeasured = 0;
  private total = 0;

  constructor(
    private readonly faults: FaultReport,
    private readonly notes: NoteReport,
    private readonly notMeasuredIsZero: boolean,
    private readonly toFraction: ((value: number) => number) | null = null,
  ) {}

  /** The value, 0 to 1, or NaN where it was refused. */
  take(cell: RawCell, where: Where): number {
    this.total += 1;
    const text = cell === null ? '' : String(cell);
    const reading = readNumberText(text, '');
    if (reading === null) return this.takeMissing(text.trim(), where);
    if (typeof reading === 'number') {
      return this.takeNumber(this.toFraction === null ? reading : this.toFraction(reading), where);
    }
    if (reading.code === 'not-finite') this.countNotFinite(reading.found, where);
    else this.faults.add({ ...where(), ...reading, expected: 'a probability from 0 to 1' });
    return Number.NaN;
  }

  /** The value of a typed array; NaN there means that nothing is known. */
  takeTyped(value: number, where: Where): number {
    this.total += 1;
    if (Number.isNaN(value)) return this.takeMissing('NaN', where);
    if (Number.isFinite(value)) return this.takeNumber(value, where);
    this.countNotFinite(String(value), where);
    return Number.NaN;
  }

  /** Reports what was counted. */
  finish(): void {
    if (this.notFinite !== null) this.faults.add(this.notFiniteFault(this.notFinite));
    if (this.outside !== null) {
      const { first, found, count, farthest } = this.outside;
      const all =
        count === 1
          ? found
          : `${found} in the first of ${count} such values (farthest ${farthest})`;
      this.faults.add({ ...first, code: 'probability-range', found: all, expected: '0 to 1' });
    }
    if (this.rounded > 0) {
      const message = `${this.rounded} values within ${roundingTolerance} of 0 or 1 are rounded onto it`;
      this.notes.inform('value-rounded', message);
    }
    if (this.unmeasured > 0) {
      const message = `${this.unmeasured} of ${this.total} values are not measured and read as 0, as chosen`;
      this.notes.inform('not-measured', message);
    }
  }

  private takeMissing(text: string, where: Where): number {
    if (this.notMeasuredIsZero) {
      this.unmeasured += 1;
      return 0;
    }
    if (text === '') {
      this.faults.add({
        ...where(),
        code: 'value-missing',
        found: 'nothing',
        expected: 'a probability from 0 to 1',
        hint: 'Choose "not measured = 0" to read empty cells as 0',
      });
    } else this.countNotFinite(text, where);
    return Number.NaN;
  }

  private takeNumber(value: number, where: Where): number {
    if (value >= 0 && value <= 1) return value + 0;
    const nearest = value < 0 ? 0 : 1;
    if (Math.abs(value - nearest) <= roundingTolerance) {
      this.rounded += 1;
      return nearest;
    }
    if (this.outside === null) {
      this.outside = { first: where(), found: String(value), count: 1, farthest: value };
    } else {
      this.outside.count += 1;
      const distance = (x: number) => Math.abs(x - 0.5);
      if (distance(value) > distance(this.outside.farthest)) this.outside.farthest = value;
    }
    return Number.NaN;
  }

  private countNotFinite(found: string, where: Where): void {
    if (this.notFinite === null) this.notFinite = { first: where(), found, count: 1 };
    else this.notFinite.count += 1;
  }

  private notFiniteFault({ first, found, count }: Tally) {
    return {
      ...first,
      code: 'not-finite',
      found: count === 1 ? found : `${found} in ${count} of ${this.total} values`,
      expected: 'a probability from 0 to 1',
      hint: 'Choose "not measured = 0" to read them as 0',
    };
  }
}
