/** A cell: text is escaped, numbers are set as numbers, null is "no data". */
export type LatexCell =
  | string
  | number
  | null
  /** `$<12.3$` */
  | { below: string }
  /** `$>0.4$` */
  | { above: string }
  /** `$3.1^{+2.2}_{-1.4}$`, or `$24 \pm 3$` where both errors read the same. */
  | { value: string; plus: string; minus: string };

export interface LatexTable {
  caption: string;
  /** For \ref; plain letters, digits, `:` and `-`. */
  label?: string;
  columns: readonly { heading: string; unit?: string; align?: 'l' | 'c' | 'r' }[];
  rows: readonly (readonly LatexCell[])[];
  /** What the reader must know beside the numbers: level, prior, ranges, how digits were rounded. */
  notes: readonly string[];
}

export type LatexStyle = 'tabular' | 'deluxetable';

const escapes: Record<string, string> = {
  '&': '\\&',
  '%': '\\%',
  _: '\\_',
  '#': '\\#',
  $: '\\$',
  '{': '\\{',
  '}': '\\}',
  '~': '\\textasciitilde{}',
  '^': '\\textasciicircum{}',
  '\\': '\\textbackslash{}',
  '<': '$<$',
  '>': '$>$',
  '|': '$|$',
  '−': '$-$',
  '±': '$\\pm$',
  '×': '$\\times$',
  '≤': '$\\le$',
  '≥': '$\\ge$',
  '∝': '$\\propto$',
  α: '$\\alpha$',
  β: '$\\beta$',
  μ: '$\\mu$',
  σ: '$\\sigma$',
  '\u00a0': '~',
  '\u2009': '\\,',
  '\u202f': '\\,',
  '–': '--',
};
const special = new RegExp(
  `[${Object.keys(escapes)
    .map((sign) => `\\u{${sign.codePointAt(0)?.toString(16)}}`)
    .join('')}]`,
  'gu',
);

/**
 * Text as LaTeX sets it: the ten special characters, signs that pdfLaTeX has only in mathematics,
 * and line breaks, which would end a paragraph.
 *
 * @example escapeLatex('50 % of A&B_1') // '50 \\% of A\\&B\\_1'
 */
export function escapeLatex(text: string): string {
  return text.replace(special, (sign) => escapes[sign]).replace(/\s*[\r\n]+\s*/g, ' ');
}

/**
 * A sentence of ours as LaTeX sets it: powers and the mass of Jupiter as mathematics.
 *
 * @example latexProse('dN/dM ∝ M^−1.3, 2 MJ') // 'dN/dM $\\propto$ $M^{-1.3}$, 2 $M_{\\mathrm{Jup}}$'
 */
export function latexProse(text: string): string {
  return escapeLatex(text)
    .replace(
      /(\w)\\textasciicircum\{\}(\$-\$)?([\d.]*\d)/g,
      (_, base, minus, power) => `$${base}^{${minus ? '-' : ''}${power}}$`,
    )
    .replace(/\bMJ\b/g, '$$M_{\\mathrm{Jup}}$$');
}

const unitsInLatex: Record<string, string> = {
  Mjup: '$M_{\\mathrm{Jup}}$',
  solMass: '$M_{\\odot}$',
  AU: 'au',
};

function unitText(unit: string): string {
  return unitsInLatex[unit] ?? escapeLatex(unit);
}

function numberText(value: number): string {
  if (!Number.isFinite(value))
    throw new RangeError(`a number in a table must be finite, got ${value}`);
  const [mantissa, exponent] = String(value).split('e');
  return exponent === undefined ? `$${mantissa}$` : `$${mantissa}\\times10^{${Number(exponent)}}$`;
}

function cellText(cell: LatexCell, style: LatexStyle): string {
  if (cell === null) return style === 'deluxetable' ? '\\nodata' : '\\ldots';
  if (typeof cell === 'string') return escapeLatex(cell);
  if (typeof cell === 'number') return numberText(cell);
  if ('below' in cell) return `$<${cell.below}$`;
  if ('above' in cell) return `$>${cell.above}$`;
  if (cell.plus === cell.minus) return `$${cell.value} \\pm ${cell.plus}$`;
  return `$${cell.value}^{+${cell.plus}}_{-${cell.minus}}$`;
}

/** After `\\` LaTeX takes `*` and `[` as arguments; the empty group keeps a name such as "* alf Cen". */
function rowText(cells: readonly LatexCell[], style: LatexStyle): string {
  const text = cells.map((cell) => cellText(cell, style)).join(' & ');
  return /^[*[]/.test(text) ? `{}${text}` : text;
}

function headLines(table: LatexTable, cell: (text: string) => string): string[] {
  const names = table.columns.map(({ heading }) => cell(escapeLatex(heading)));
  const units = table.columns.map(({ unit }) => cell(unit ? `(${unitText(unit)})` : ''));
  const hasUnits = table.columns.some(({ unit }) => unit !== undefined && unit !== '');
  return hasUnits ? [names.join(' & '), units.join(' & ')] : [names.join(' & ')];
}

function writeTabular(table: LatexTable, align: string, label: string): string[] {
  return [
    '\\begin{table}',
    '\\centering',
    `\\caption{${escapeLatex(table.caption)}}${label}`,
    `\\begin{tabular}{${align}}`,
    '\\hline',
    ...headLines(table, (text) => text).map((line) => `${line} \\\\`),
    '\\hline',
    ...table.rows.map((row) => `${rowText(row, 'tabular')} \\\\`),
    '\\hline',
    '\\end{tabular}',
    ...(table.notes.length > 0
      ? ['', `\\par\\small ${table.notes.map(latexProse).join(' ')}`]
      : []),
    '\\end{table}',
  ];
}

function writeDeluxetable(table: LatexTable, align: string, label: string): string[] {
  const head = headLines(table, (text) => `\\colhead{${text}}`).join(' \\\\ ');
  return [
    `\\begin{deluxetable}{${align}}`,
    `\\tablecaption{${escapeLatex(table.caption)}${label}}`,
    `\\tablehead{${head}}`,
    '\\startdata',
    table.rows.map((row) => rowText(row, 'deluxetable')).join(' \\\\\n'),
    '\\enddata',
    ...(table.notes.length > 0
      ? [`\\tablecomments{${table.notes.map(latexProse).join(' ')}}`]
      : []),
    '\\end{deluxetable}',
  ];
}

/**
 * Writes a table for a paper: `deluxetable` for AASTeX, plain `tabular` for everything else.
 *
 * @throws RangeError for a row whose length is not that of the columns, and for infinite numbers
 */
export function writeLatexTable(table: LatexTable, style: LatexStyle): string {
  const width = table.columns.length;
  const uneven = table.rows.find((row) => row.length !== width);
  if (uneven !== undefined)
    throw new RangeError(`a row must have ${width} cells, got ${uneven.length}`);
  if (table.label !== undefined && !/^[A-Za-z0-9:-]+$/.test(table.label)) {
    throw new RangeError(`label must be letters, digits, : and -, got ${table.label}`);
  }
  const align = table.columns.map((column) => column.align ?? 'c').join('');
  const label = table.label === undefined ? '' : `\\label{${table.label}}`;
  const write = style === 'deluxetable' ? writeDeluxetable : writeTabular;
  return `${write(table, align, label).join('\n')}\n`;
}

const uncertaintyFigures = 2;

/**
 * A value with its errors as a cell: decimals follow the smaller error, with two figures of it.
 *
 * @param value any finite number
 * @param plus upper error, > 0, in the unit of the value
 * @param minus lower error, > 0
 * @throws RangeError for an error that is not positive
 * @example latexMeasurement(3.14159, 2.2, 1.4) // { value: '3.1', plus: '2.2', minus: '1.4' }
 */
export function latexMeasurement(value: number, plus: number, minus: number): LatexCell {
  const smaller = Math.min(plus, minus);
  if (!(smaller > 0)) throw new RangeError(`errors must be > 0, got ${plus} and ${minus}`);
  const exponent = Math.floor(Math.log10(smaller));
  const decimals = Math.min(Math.max(uncertaintyFigures - 1 - exponent, 0), 100);
  const [v, p, m] = [value, plus, minus].map((x) => x.toFixed(decimals));
  return { value: v, plus: p, minus: m };
}
