import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  foldName,
  readUpload,
  type TargetRecord,
  type WrittenTarget,
  writeTargets,
} from '@/lib/formats';
import { ABSENT_TARGET } from '../../support/written-target';

const orNull = <T>(arbitrary: fc.Arbitrary<T>) => fc.option(arbitrary, { nil: null });
const finite = fc.double({ noNaN: true, noDefaultInfinity: true });
const positive = fc.double({ min: Number.MIN_VALUE, max: Number.MAX_VALUE, noNaN: true });
const zeroToOne = fc.double({ min: 0, max: 1, noNaN: true });

/** Text without control or direction characters, trimmed, not blank, not starting a formula. */
const plainText = (maxLength: number) =>
  fc
    .string({ unit: 'grapheme', minLength: 1, maxLength })
    .map((text) =>
      text.replace(/[\p{Cc}\u061c\u200b\u200e\u200f\u2028-\u202e\u2066-\u2069\ufeff]/gu, '').trim(),
    )
    .map((text) => text.replace(/^[=+\-@\s]+/, '').trim())
    .filter((text) => text !== '' && Array.from(text).length <= 100);

const prose = fc
  .oneof(
    fc.string({ unit: 'grapheme', maxLength: 60 }),
    fc.constantFrom(
      '=1+2',
      "'=1",
      "''-x",
      '+5 mas',
      '@home',
      '\tindented',
      'two\nlines',
      'a "b", c#d\r\ne',
    ),
  )
  .map((text) =>
    text.replace(
      /[^\P{Cc}\t\n\r]|[\u061c\u200b\u200e\u200f\u2028-\u202e\u2066-\u2069\ufeff]/gu,
      '',
    ),
  )
  .filter((text) => text.trim() !== '');

const distance = fc.oneof(
  fc.record({
    parallaxMas: positive,
    parallaxErrorMas: orNull(fc.double({ min: 0, max: 1e300, noNaN: true })),
  }),
  fc.record({
    distancePc: positive,
    distanceErrorPc: orNull(fc.double({ min: 0, max: 1e300, noNaN: true })),
  }),
  fc.constant({}),
);

const ageMyr = fc.double({ min: Number.MIN_VALUE, max: 13_800, noNaN: true });
const share = fc.double({ min: 0, max: 0.999, noNaN: true });
const age = fc
  .oneof(
    ageMyr.map((value) => ({ ageMyr: value })),
    fc.tuple(ageMyr, share).map(([value, s]) => withErrors(value, value * s, value * s)),
    fc
      .tuple(ageMyr, share, positive)
      .map(([value, s, upper]) => withErrors(value, value * s, upper)),
    fc.tuple(fc.double({ min: 1, max: 13_800, noNaN: true }), zeroToOne).map(([value, dex]) => ({
      ageMyr: value,
      logAgeErrorDex: dex,
      ageLowerMyr: value / 10 ** dex,
      ageUpperMyr: value * 10 ** dex,
    })),
    fc
      .tuple(ageMyr, ageMyr)
      .filter(([a, b]) => a !== b)
      .map(([a, b]) => ({
        ageMinMyr: Math.min(a, b),
        ageMaxMyr: Math.max(a, b),
      })),
    fc.constant({}),
  )
  .filter((x) => !('ageLowerMyr' in x) || (x.ageLowerMyr > 0 && Number.isFinite(x.ageUpperMyr)));

function withErrors(value: number, lower: number, upper: number) {
  return {
    ageMyr: value,
    ageErrorLowerMyr: lower,
    ageErrorUpperMyr: upper,
    ageLowerMyr: value - lower,
    ageUpperMyr: value + upper,
  };
}

const notNegative = fc.double({ min: 0, max: Number.MAX_VALUE, noNaN: true });
const magnitude = fc.record({ valueMag: finite, errorMag: orNull(notNegative) });
const position = fc.oneof(
  fc.record({
    raDeg: fc.double({ min: 0, max: 359.999_999_999_999_9, noNaN: true }),
    decDeg: fc.double({ min: -90, max: 90, noNaN: true }),
    refEpoch: fc.double({ min: 1800, max: 2200, noNaN: true }),
  }),
  fc.constant({}),
);

const target: fc.Arbitrary<WrittenTarget> = fc
  .tuple(
    fc.record({
      name: plainText(30),
      otherNames: fc.array(
        plainText(12).filter((name) => !name.includes(';')),
        { maxLength: 2 },
      ),
      gaiaDr3Id: orNull(fc.bigInt({ min: 0n, max: 2n ** 63n - 1n }).map(String)),
      pmRaMasYr: orNull(finite),
      pmDecMasYr: orNull(finite),
      hostMassMsun: orNull(positive),
      hostMassErrorMsun: orNull(notNegative),
      spectralType: orNull(plainText(12)),
      movingGroup: orNull(plainText(12)),
      membershipProbability: orNull(zeroToOne),
      magnitudes: fc.dictionary(fc.constantFrom('J', 'K', 'Ks', 'g', 'G'), magnitude, {
        noNullPrototype: true,
      }),
      multiplicity: orNull(fc.constantFrom('single', 'binary', 'multiple')),
      binarySemiMajorAxisAu: orNull(positive),
      binaryEccentricity: orNull(fc.double({ min: 0, max: 1 - Number.EPSILON, noNaN: true })),
      binaryMassRatio: orNull(fc.double({ min: Number.MIN_VALUE, max: 1, noNaN: true })),
      debrisDisk: orNull(fc.boolean()),
      selectedForCompanion: orNull(fc.boolean()),
      notes: orNull(prose),
      reference: orNull(plainText(30)),
    }),
    position,
    distance,
    age,
  )
  .map((parts) => Object.assign({}, ABSENT_TARGET, ...parts) as WrittenTarget);

/** A survey never lists a name or a Gaia number twice. */
function distinct(targets: WrittenTarget[]): WrittenTarget[] {
  const names = new Set<string>();
  const ids = new Set<string>();
  return targets.filter((each) => {
    const own = [each.name, ...each.otherNames].map(foldName);
    if (new Set(own).size !== own.length || own.some((name) => names.has(name))) return false;
    if (each.gaiaDr3Id !== null && ids.has(each.gaiaDr3Id)) return false;
    for (const name of own) names.add(name);
    if (each.gaiaDr3Id !== null) ids.add(each.gaiaDr3Id);
    return true;
  });
}

function readBack(text: string): TargetRecord[] {
  const bytes = new TextEncoder().encode(text);
  const result = readUpload(bytes, { fileName: 'targets.csv', kind: 'targets' });
  if (!result.ok) throw new Error(JSON.stringify(result.faults));
  if (result.kind !== 'targets') throw new Error(result.kind);
  return result.records;
}

const withoutLines = (records: TargetRecord[]) => records.map(({ line: _, ...rest }) => rest);

describe('writeTargets(targets)', { timeout: 60_000 }, () => {
  it('reads back to the same records, to the last bit', () => {
    fc.assert(
      fc.property(fc.array(target, { minLength: 1, maxLength: 20 }).map(distinct), (targets) => {
        fc.pre(targets.length > 0);
        expect(withoutLines(readBack(writeTargets(targets)))).toEqual(targets);
      }),
      { numRuns: 300 },
    );
  });

  it('reads back 500 rows with gaps, each on its own line', () => {
    const [targets] = fc.sample(fc.array(target, { minLength: 500, maxLength: 500 }), {
      numRuns: 1,
      seed: 11,
    });
    const records = readBack(writeTargets(distinct(targets)));
    expect(withoutLines(records)).toEqual(distinct(targets));
    expect(new Set(records.map((record) => record.line)).size).toBe(records.length);
  });

  it.each([Number.MIN_VALUE, Number.MAX_VALUE, 0.1 + 0.2, 1 / 3, 2 ** -1074 * 3, 5e-324, 1.7e308])(
    'keeps the bits of %d',
    (hostMassMsun) => {
      const [record] = readBack(
        writeTargets([{ ...ABSENT_TARGET, name: 'RB 1', distancePc: 20, hostMassMsun }]),
      );
      expect(record.hostMassMsun).toBe(hostMassMsun);
    },
  );

  it('keeps all 19 digits of a Gaia DR3 number', () => {
    const [record] = readBack(
      writeTargets([{ ...ABSENT_TARGET, name: 'RB 1', gaiaDr3Id: '6151712717763155414' }]),
    );
    expect(record.gaiaDr3Id).toBe('6151712717763155414');
  });

  it('leaves out columns that no target fills, and adds the ones asked for', () => {
    const text = writeTargets(
      [{ ...ABSENT_TARGET, name: 'RB 1', distancePc: 20 }],
      [{ name: 'used', values: [true] }],
    );
    expect(text).toBe('name,distance,used\nRB 1,20,true\n');
  });

  it('computes age errors from the 16 and 84 % points where only those are kept', () => {
    const text = writeTargets([
      { ...ABSENT_TARGET, name: 'RB 1', ageMyr: 40, ageLowerMyr: 30, ageUpperMyr: 55 },
    ]);
    expect(text).toBe('name,age,age_error_lower,age_error_upper\nRB 1,40,10,15\n');
  });
});
