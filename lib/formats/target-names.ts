import { findTargetNameProblem, foldName } from './names';
import { type Cell, refused, type TableReading } from './reading';
import { quoteFound } from './reports';

const largestGaiaId = 2n ** 63n - 1n;

/** Reads a name, the other names and the Gaia DR3 number, and refuses the second of two equals. */
export class TargetNames {
  private readonly lineByFold = new Map<string, { row: number; written: string }>();
  private readonly rowByGaia = new Map<string, { row: number; name: string }>();

  constructor(private readonly reading: TableReading) {}

  readName(row: number): string | typeof refused {
    const name = this.reading.raw('name', row);
    if (name === null) {
      this.reading.missing('name', row, 'a target name');
      return refused;
    }
    return this.claim(name, 'name', row);
  }

  readOtherNames(row: number, ownName: string): string[] {
    const own = foldName(ownName);
    const others = (this.reading.raw('other_names', row) ?? '')
      .split(';')
      .map((name) => name.trim())
      .filter((name) => name !== '' && foldName(name) !== own);
    const seen = new Set<string>();
    return others.filter((name) => {
      const fold = foldName(name);
      if (seen.has(fold)) return false;
      seen.add(fold);
      return this.claim(name, 'other_names', row) !== refused;
    });
  }

  readGaiaId(row: number, name: string): Cell<string> {
    const text = this.reading.raw('gaia_dr3_id', row);
    if (text === null) return null;
    const problem = gaiaProblem(text);
    const place = this.reading.place(row, 'gaia_dr3_id');
    if (problem !== null) {
      this.reading.fault(place, problem);
      return refused;
    }
    const first = this.rowByGaia.get(text);
    if (first !== undefined) {
      this.reading.fault(place, {
        code: 'name-duplicate',
        message: `Gaia DR3 ${text} is already on ${this.where(first.row)} as ${quoteFound(first.name)}; expected each star once`,
      });
      return refused;
    }
    this.rowByGaia.set(text, { row, name });
    return text;
  }

  private claim(name: string, column: string, row: number): string | typeof refused {
    const problem = findTargetNameProblem(name);
    const place = this.reading.place(row, column);
    if (problem !== null) {
      this.reading.fault(place, problem);
      return refused;
    }
    const fold = foldName(name);
    const first = this.lineByFold.get(fold);
    if (first === undefined) {
      this.lineByFold.set(fold, { row, written: name });
      return name;
    }
    const where = this.where(first.row);
    this.reading.fault(place, {
      code: 'name-duplicate',
      message:
        first.written === name
          ? `target ${quoteFound(name)} is already on ${where}; expected each target once`
          : `target ${quoteFound(name)} reads the same as ${quoteFound(first.written)} on ${where} (case and spaces are ignored); expected each target once`,
    });
    return refused;
  }

  private where(row: number): string {
    const { line } = this.reading.place(row);
    return line === undefined ? `row ${row + 1}` : `line ${line}`;
  }
}

function gaiaProblem(text: string): { code: string; found: string; expected: string } | null {
  if (/^\d{1,19}$/.test(text)) {
    if (BigInt(text) <= largestGaiaId) return null;
    return { code: 'out-of-range', found: text, expected: `at most ${largestGaiaId}` };
  }
  if (/^\d+$/.test(text)) {
    return {
      code: 'out-of-range',
      found: `${text.length} digits`,
      expected: `at most ${largestGaiaId}`,
    };
  }
  if (/^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i.test(text)) {
    return {
      code: 'integer-precision',
      found: `${quoteFound(text)}, which has lost its last digits`,
      expected: '1 to 19 digits, kept as text',
    };
  }
  return { code: 'not-a-number', found: quoteFound(text), expected: '1 to 19 digits' };
}
