import type {
  CompanionRecord,
  CoolingTableRecord,
  CurveRecord,
  MapRecord,
  ReadResult,
  SystemsRecord,
  TargetRecord,
} from '@/lib/formats';
import { uploadLimits } from '@/lib/formats/limits';

type Rule = (value: number) => boolean;

const above0: Rule = (value) => Number.isFinite(value) && value > 0;
const from0: Rule = (value) => Number.isFinite(value) && value >= 0;
const share: Rule = (value) => value >= 0 && value <= 1;
const finite: Rule = Number.isFinite;

/** What a stored value may be, written from the description of the files and not from the readers. */
const targetRules: [keyof TargetRecord, Rule][] = [
  ['raDeg', (value) => value >= 0 && value < 360],
  ['decDeg', (value) => value >= -90 && value <= 90],
  ['refEpoch', finite],
  ['pmRaMasYr', finite],
  ['pmDecMasYr', finite],
  ['parallaxMas', above0],
  ['parallaxErrorMas', from0],
  ['distancePc', above0],
  ['distanceErrorPc', from0],
  ['ageMyr', (value) => value > 0 && value <= 13_800],
  ['ageLowerMyr', finite],
  ['ageUpperMyr', above0],
  ['ageMinMyr', above0],
  ['ageMaxMyr', above0],
  ['hostMassMsun', above0],
  ['hostMassErrorMsun', from0],
  ['membershipProbability', share],
  ['binarySemiMajorAxisAu', above0],
  ['binaryEccentricity', (value) => value >= 0 && value < 1],
  ['binaryMassRatio', (value) => value > 0 && value <= 1],
];

const companionRules: [keyof CompanionRecord, Rule][] = [
  ['massMjup', above0],
  ['massErrorLowerMjup', from0],
  ['massErrorUpperMjup', from0],
  ['semiMajorAxisAu', above0],
  ['semiMajorAxisErrorLowerAu', from0],
  ['semiMajorAxisErrorUpperAu', from0],
  ['projectedSeparationAu', above0],
  ['separationArcsec', above0],
  ['separationErrorArcsec', from0],
  ['positionAngleDeg', finite],
  ['positionAngleErrorDeg', from0],
  ['contrastMag', finite],
  ['contrastErrorMag', from0],
  ['eccentricity', (value) => value >= 0 && value < 1],
  ['probability', share],
];

function breakOf<R extends object>(record: R, rules: [keyof R, Rule][]): string | null {
  for (const [key, rule] of rules) {
    const value = record[key];
    if (value !== null && !(typeof value === 'number' && rule(value))) {
      return `${String(key)} is ${String(value)}`;
    }
  }
  return null;
}

const increases = (values: number[]) =>
  values.every((value, i) => Number.isFinite(value) && (i === 0 || value > values[i - 1]));
const isAxis = (values: number[]) => values.length > 0 && values[0] > 0 && increases(values);

const isName = (name: string) =>
  name.length > 0 &&
  Array.from(name).length <= uploadLimits.nameCharacters &&
  !/^[=+\-@]|\p{Cc}|[\u061c\u200e\u200f\u202a-\u202e\u2066-\u2069]/u.test(name);

function inTarget(target: TargetRecord): string | null {
  if (!isName(target.name)) return `the name is ${JSON.stringify(target.name)}`;
  const { gaiaDr3Id, raDeg, decDeg, magnitudes } = target;
  const isTooLong = gaiaDr3Id !== null && !/^\d{1,19}$/.test(gaiaDr3Id);
  if (isTooLong || (gaiaDr3Id !== null && BigInt(gaiaDr3Id) > 2n ** 63n - 1n)) {
    return `gaiaDr3Id is ${gaiaDr3Id}`;
  }
  if ((raDeg === null) !== (decDeg === null)) return 'one of ra and dec is missing';
  for (const [band, { valueMag, errorMag }] of Object.entries(magnitudes)) {
    if (!finite(valueMag)) return `mag_${band} is ${valueMag}`;
    if (errorMag !== null && !from0(errorMag)) return `mag_${band}_error is ${errorMag}`;
  }
  return breakOf(target, targetRules);
}

function inCurve(curve: CurveRecord): string | null {
  const { separationArcsec, contrastMag, coverage, nSigma, thresholdProbability } = curve;
  if (!isName(curve.target)) return `the target is ${JSON.stringify(curve.target)}`;
  if (separationArcsec.length < 2 || !isAxis(separationArcsec))
    return 'separations do not increase';
  if (contrastMag.length !== separationArcsec.length) return 'contrasts and separations differ';
  if (!contrastMag.every(from0)) return `contrast is ${contrastMag.find((x) => !from0(x))}`;
  if (coverage && !(coverage.length === contrastMag.length && coverage.every(share))) {
    return 'coverage is outside 0 to 1';
  }
  if (!above0(nSigma)) return `nSigma is ${nSigma}`;
  return share(thresholdProbability) ? null : `threshold probability is ${thresholdProbability}`;
}

function inMap(map: MapRecord): string | null {
  const { massMjup, semiMajorAxisAu, completeness } = map;
  if (!isName(map.target)) return `the target is ${JSON.stringify(map.target)}`;
  if (!isAxis(massMjup)) return 'masses do not increase from above 0';
  if (!isAxis(semiMajorAxisAu)) return 'semi-major axes do not increase from above 0';
  const less = map.nodeKind === 'cells' ? 1 : 0;
  const expected = (massMjup.length - less) * (semiMajorAxisAu.length - less);
  if (completeness.length !== expected) return `${completeness.length} values for ${expected}`;
  const outside = completeness.find((value) => !share(value));
  return outside === undefined ? null : `completeness is ${outside}`;
}

const known = (values: (number | null)[]) => values.filter((value) => value !== null);

function inCooling(table: CoolingTableRecord): string | null {
  const { massMjup, ageMyr, magnitudes, logLuminosity, temperatureK } = table;
  if (!isAxis(massMjup) || !isAxis(ageMyr)) return 'an axis does not increase from above 0';
  const size = massMjup.length * ageMyr.length;
  for (const [band, values] of Object.entries(magnitudes)) {
    if (values.length !== size) return `mag_${band} has ${values.length} values for ${size}`;
    if (!known(values).every(finite)) return `mag_${band} is not finite`;
  }
  if (logLuminosity && !known(logLuminosity).every(finite)) return 'a luminosity is not finite';
  if (temperatureK && !known(temperatureK).every(above0)) return 'a temperature is not above 0';
  return Object.keys(magnitudes).length > 0 ? null : 'a table without a band';
}

function inSystems({ weight, companionSystem, massMjup, semiMajorAxisAu }: SystemsRecord) {
  if (!weight.every(from0)) return 'a weight is below 0';
  if (!companionSystem.every((index) => index >= 0 && index < weight.length)) return 'no system';
  if (!massMjup.every(above0) || !semiMajorAxisAu.every(above0)) return 'a companion is at 0';
  return null;
}

const first = <R>(records: R[], inside: (record: R) => string | null) => {
  for (const record of records) {
    const found = inside(record);
    if (found !== null) return found;
  }
  return null;
};

/** The first value of an accepted file that is outside its domain, in words; null where none is. */
export function findOutside(result: ReadResult & { ok: true }): string | null {
  switch (result.kind) {
    case 'targets':
      return first(result.records, inTarget);
    case 'contrast-curves':
      return first(result.records, inCurve);
    case 'completeness-maps':
      return first(result.records, inMap);
    case 'companions':
      return first(result.records, (record) => breakOf(record, companionRules));
    case 'cooling-tables':
      return first(result.records, inCooling);
    case 'systems':
      return first(result.records, inSystems);
  }
}
