import { notNegative, refused, type TableReading } from './reading';

export interface AgeReading {
  ageMyr: number | null;
  ageLowerMyr: number | null;
  ageUpperMyr: number | null;
  ageErrorLowerMyr: number | null;
  ageErrorUpperMyr: number | null;
  logAgeErrorDex: number | null;
  ageMinMyr: number | null;
  ageMaxMyr: number | null;
}

const ageRule = { above: 0, max: 13_800, expected: 'more than 0 and at most 13800 Myr' };
const spreads = [
  ['age_error'],
  ['age_error_lower', 'age_error_upper'],
  ['log_age_error'],
  ['age_min', 'age_max'],
];

const none: AgeReading = {
  ageMyr: null,
  ageLowerMyr: null,
  ageUpperMyr: null,
  ageErrorLowerMyr: null,
  ageErrorUpperMyr: null,
  logAgeErrorDex: null,
  ageMinMyr: null,
  ageMaxMyr: null,
};

/**
 * Reads the age of one row and its spread, of which there are four styles and one may be used.
 *
 * A symmetric error s and a pair of errors give the 16 % and 84 % points t - s, t + s; an error of
 * d dex gives t 10^-d, t 10^d; bounds are kept as bounds. Faults go to the report.
 */
export function readAge(reading: TableReading, row: number): AgeReading {
  const age = reading.number('age', row, ageRule);
  const error = reading.number('age_error', row, notNegative);
  const lower = reading.number('age_error_lower', row, notNegative);
  const upper = reading.number('age_error_upper', row, notNegative);
  const dex = reading.number('log_age_error', row, notNegative);
  const min = reading.number('age_min', row, ageRule);
  const max = reading.number('age_max', row, ageRule);
  if ([age, error, lower, upper, dex, min, max].includes(refused)) return none;

  const given = new Map(
    Object.entries({
      age_error: error,
      age_error_lower: lower,
      age_error_upper: upper,
      log_age_error: dex,
      age_min: min,
      age_max: max,
    }).filter(([, value]) => value !== null),
  );
  if (!isOneStyle(reading, row, given)) return none;
  const result: AgeReading = {
    ...none,
    ageMyr: age ?? null,
    ageErrorLowerMyr: error ?? lower ?? null,
    ageErrorUpperMyr: error ?? upper ?? null,
    logAgeErrorDex: dex ?? null,
    ageMinMyr: min ?? null,
    ageMaxMyr: max ?? null,
  };
  checkBounds(reading, row, result);
  return withPoints(reading, row, result);
}

function isOneStyle(
  reading: TableReading,
  row: number,
  given: ReadonlyMap<string, unknown>,
): boolean {
  const used = spreads.filter((style) => style.some((name) => given.has(name)));
  if (used.length > 1) {
    const names = used.map((style) => style.filter((name) => given.has(name)).join(', '));
    reading.fault(reading.place(row), {
      code: 'both-given',
      found: names.join(' and also '),
      expected: 'one way to state the spread of the age',
    });
    return false;
  }
  const half = used.flat().find((name) => !given.has(name));
  if (half !== undefined) {
    const other = used.flat().find((name) => given.has(name));
    reading.fault(reading.place(row), {
      code: 'pair-missing',
      found: `"${other}" without "${half}"`,
      expected: 'both or neither',
    });
    return false;
  }
  return true;
}

function checkBounds(reading: TableReading, row: number, age: AgeReading): void {
  const { ageMyr, ageMinMyr, ageMaxMyr } = age;
  if (ageMinMyr === null || ageMaxMyr === null) return;
  if (!(ageMinMyr < ageMaxMyr)) {
    reading.fault(reading.place(row), {
      code: 'range-order',
      found: `age_min ${ageMinMyr} and age_max ${ageMaxMyr} Myr`,
      expected: 'age_min below age_max',
    });
  } else if (ageMyr !== null && (ageMyr < ageMinMyr || ageMyr > ageMaxMyr)) {
    reading.fault(reading.place(row), {
      code: 'inconsistent',
      found: `age ${ageMyr} Myr outside age_min ${ageMinMyr} and age_max ${ageMaxMyr} Myr`,
      expected: 'the age within its bounds',
    });
  }
}

/** Adds the 16 % and 84 % points, which must lie above 0. */
function withPoints(reading: TableReading, row: number, age: AgeReading): AgeReading {
  const { ageMyr, ageErrorLowerMyr, ageErrorUpperMyr, logAgeErrorDex } = age;
  if (ageErrorLowerMyr === null && logAgeErrorDex === null) return age;
  if (ageMyr === null) {
    reading.missing('age', row, 'an age, as its error is given');
    return age;
  }
  const factor = 10 ** (logAgeErrorDex ?? 0);
  const ageLowerMyr = ageErrorLowerMyr === null ? ageMyr / factor : ageMyr - ageErrorLowerMyr;
  const ageUpperMyr = ageErrorUpperMyr === null ? ageMyr * factor : ageMyr + ageErrorUpperMyr;
  if (ageLowerMyr > 0 && Number.isFinite(ageUpperMyr)) return { ...age, ageLowerMyr, ageUpperMyr };
  const column = ['age_error', 'age_error_lower', 'log_age_error'].find(
    (name) => reading.raw(name, row) !== null,
  );
  reading.fault(reading.place(row, column), {
    code: 'out-of-range',
    found: `an error of ${ageErrorLowerMyr ?? `${logAgeErrorDex} dex`} for an age of ${ageMyr} Myr`,
    expected: 'an error smaller than the age',
    hint: 'An age that may be close to 0 needs age_error_lower and age_error_upper, or bounds',
  });
  return age;
}
