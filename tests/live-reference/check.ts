import { createRandom, deriveSeed } from '@/lib/numerics/random';

export type Program = 'R' | 'SciPy';

/** A difference is allowed up to abs + rel |theirs| + standardErrors times the program's own. */
export interface Tolerance {
  abs?: number;
  rel?: number;
  standardErrors?: number;
  because: string;
}

interface CheckOf<Row> {
  name: string;
  program: Program;
  /** Name of the question in the program's script. */
  what: string;
  rows: Row[];
  ours: (row: Row) => number | ArrayLike<number>;
  tolerance: Tolerance;
}

/** One question that a program and the product answer for several rows of input. */
export interface LiveCheck {
  name: string;
  program: Program;
  what: string;
  rows: unknown[];
  /** The product's answer to a row, by its number. */
  ours(row: number): number[];
  tolerance: Tolerance;
}

export function liveCheck<Row>({ ours, rows, ...rest }: CheckOf<Row>): LiveCheck {
  return {
    ...rest,
    rows,
    ours: (row) => {
      const answer = ours(rows[row]);
      return typeof answer === 'number' ? [answer] : Array.from(answer);
    },
  };
}

const SEED = 'live reference 1';

/** Inputs drawn for one check; six digits, so that every program reads the same number. */
export interface Inputs {
  between(low: number, high: number): number;
  logBetween(low: number, high: number): number;
  whole(low: number, high: number): number;
  pick<T>(values: readonly T[]): T;
}

/** Rows of random inputs, the same in every run. */
export function draw<Row>(name: string, count: number, row: (inputs: Inputs) => Row): Row[] {
  const { uniform } = createRandom(deriveSeed(SEED, name));
  const shortly = (value: number) => Number(value.toPrecision(6));
  const whole = (low: number, high: number) => low + Math.floor(uniform() * (high - low + 1));
  const inputs: Inputs = {
    between: (low, high) => shortly(low + (high - low) * uniform()),
    logBetween: (low, high) => shortly(low * (high / low) ** uniform()),
    whole,
    pick: (values) => values[whole(0, values.length - 1)],
  };
  return Array.from({ length: count }, () => row(inputs));
}
