import { readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, test } from 'vitest';

export interface Tolerance {
  abs?: number;
  rel?: number;
  rms?: number;
}

/** One outside value; `checks/README.md` says what the fields mean. */
export interface Check<Inputs = Record<string, unknown>> {
  name: string;
  inputs: Inputs;
  expected: unknown;
  tolerance: Tolerance;
  source: string;
  kind: string;
}

/** Computes what a check expects: a number, an array, or an object with at least the same keys. */
// biome-ignore lint/suspicious/noExplicitAny: each runner names the shape of its own check's inputs
export type Runner = (inputs: any, check: Check) => unknown;

export interface CheckPlan {
  /** By beginning of the check's name; the longest beginning that fits is taken. */
  runners: Record<string, Runner>;
  /** Checks that a later part of the product will answer: beginning of the name, and why. */
  later?: Record<string, string>;
}

const FOLDER = path.resolve(import.meta.dirname, '../checks');

/** Reads a check file of `tests/reference/checks`, by its name without `.json`. */
export function readChecks(file: string): Check[] {
  const parsed = JSON.parse(readFileSync(path.join(FOLDER, `${file}.json`), 'utf8')) as {
    checks: Check[];
  };
  return parsed.checks;
}

/**
 * Where a value leaves its tolerance: |x - expected| <= abs + rel |expected| for every number, and
 * the root mean square over all numbers of the check where `rms` is given.
 */
export function differences(
  actual: unknown,
  expected: unknown,
  tolerance: Tolerance,
  place = 'value',
): string[] {
  const faults: string[] = [];
  const squares: number[] = [];
  collect(actual, expected, tolerance, place, faults, squares);
  if (tolerance.rms !== undefined && squares.length > 0) {
    const rms = Math.sqrt(squares.reduce((a, b) => a + b, 0) / squares.length);
    if (!(rms <= tolerance.rms)) faults.push(`${place}: rms ${rms} is above ${tolerance.rms}`);
  }
  return faults;
}

function collect(
  actual: unknown,
  expected: unknown,
  tolerance: Tolerance,
  place: string,
  faults: string[],
  squares: number[],
): void {
  if (typeof expected === 'number') {
    const difference = typeof actual === 'number' ? Math.abs(actual - expected) : Number.NaN;
    squares.push(difference * difference);
    const allowed = (tolerance.abs ?? 0) + (tolerance.rel ?? 0) * Math.abs(expected);
    if (!(difference <= allowed))
      faults.push(`${place}: ${actual} is not ${expected} ± ${allowed}`);
    return;
  }
  if (Array.isArray(expected)) {
    const values = toArray(actual);
    if (values === null || values.length !== expected.length) {
      faults.push(`${place}: ${values?.length ?? typeof actual} values, not ${expected.length}`);
      return;
    }
    for (let i = 0; i < expected.length; i++) {
      collect(values[i], expected[i], tolerance, `${place}[${i}]`, faults, squares);
    }
    return;
  }
  if (expected !== null && typeof expected === 'object') {
    for (const [key, part] of Object.entries(expected)) {
      const inner = (actual as Record<string, unknown> | undefined)?.[key];
      collect(inner, part, tolerance, `${place}.${key}`, faults, squares);
    }
    return;
  }
  if (actual !== expected) faults.push(`${place}: ${String(actual)} is not ${String(expected)}`);
}

function toArray(value: unknown): unknown[] | null {
  if (Array.isArray(value)) return value;
  return ArrayBuffer.isView(value) ? Array.from(value as Float64Array) : null;
}

/**
 * One test per check of a file. A check with neither a runner nor a reason to wait fails, as does a
 * runner or a reason that fits no check: the plan can neither forget a value nor go stale.
 */
export function runCheckFile(file: string, plan: CheckPlan): void {
  const checks = readChecks(file);
  const runnerNames = Object.keys(plan.runners);
  const laterNames = Object.keys(plan.later ?? {});
  const names = [...runnerNames, ...laterNames];
  const chosen = checks.map((check) => longestBeginning(check.name, names));
  describe(`${file}.json`, () => {
    checks.forEach((check, i) => {
      const name = chosen[i];
      if (name !== undefined && laterNames.includes(name)) return;
      test(check.name, () => {
        expect(name, `no runner for "${check.name}" and no reason to leave it`).toBeDefined();
        const actual = plan.runners[name as string](check.inputs, check);
        expect(differences(actual, check.expected, check.tolerance)).toEqual([]);
      });
    });
    test('every runner and every reason to wait belongs to a check', () => {
      expect(names.filter((name) => !chosen.includes(name))).toEqual([]);
    });
    for (const name of laterNames) {
      const count = chosen.filter((other) => other === name).length;
      console.info(`${file}: ${count} "${name}" belong to a later part: ${plan.later?.[name]}`);
    }
  });
}

function longestBeginning(name: string, beginnings: string[]): string | undefined {
  return beginnings
    .filter((beginning) => name.startsWith(beginning))
    .sort((a, b) => b.length - a.length)[0];
}
