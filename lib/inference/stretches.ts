import type { Stretch } from './integrated-density';

/** A place in the support. The complement 1 - x and the logarithms are given, because near a
 * singular end x itself has lost their digits. */
export interface Place {
  readonly x: number;
  readonly logX: number;
  readonly complement: number;
  readonly logComplement: number;
}

/** Logarithms are worked out when they are asked for: most densities need neither. */
class PlaceFromZero implements Place {
  readonly complement: number;
  constructor(readonly x: number) {
    this.complement = 1 - x;
  }
  get logX() {
    return Math.log(this.x);
  }
  get logComplement() {
    return Math.log1p(-this.x);
  }
}

class PlaceFromOne implements Place {
  readonly x: number;
  constructor(readonly complement: number) {
    this.x = 1 - complement;
  }
  get logX() {
    return Math.log1p(-this.complement);
  }
  get logComplement() {
    return Math.log(this.complement);
  }
}

/** ln of an unnormalised density per dx. */
export type LogDensity = (place: Place) => number;

/** The place of x, with the digits that x has. */
export function placeAt(x: number): Place {
  return new PlaceFromZero(x);
}

/** Power of v that makes x^(exponent - 1) dx smooth at x = 0. */
function smoothingPower(exponent: number): number {
  if (Number.isInteger(exponent)) return 1;
  if (Number.isInteger(2 * exponent)) return 2;
  return Math.ceil(exponent) / exponent;
}

/** [0, to] in x = to v^m, for a density that behaves as x^(exponent - 1) at 0. */
export function fromZero(to: number, exponent: number, logDensity: LogDensity): Stretch {
  const power = smoothingPower(exponent);
  const logTo = Math.log(to);
  return {
    from: 0,
    to,
    isReversed: false,
    toX: (v) => to * (power === 1 ? v : v ** power),
    toV: (x) => (power === 1 ? x / to : (x / to) ** (1 / power)),
    logDensity(v) {
      if (power === 1) return logDensity(new PlaceFromZero(to * v)) + logTo;
      const logV = Math.log(v);
      const logX = logTo + power * logV;
      const x = Math.exp(logX);
      const place = { x, logX, complement: 1 - x, logComplement: Math.log1p(-x) };
      return logDensity(place) + Math.log(power) + logX - logV;
    },
  };
}

/** [from, 1] in 1 - x = (1 - from) v^m, v from the upper end, for (1 - x)^(exponent - 1) at 1. */
export function fromOne(from: number, exponent: number, logDensity: LogDensity): Stretch {
  const power = smoothingPower(exponent);
  const span = 1 - from;
  const logSpan = Math.log(span);
  return {
    from,
    to: 1,
    isReversed: true,
    toX: (v) => 1 - span * (power === 1 ? v : v ** power),
    toV: (x) => (power === 1 ? (1 - x) / span : ((1 - x) / span) ** (1 / power)),
    logDensity(v) {
      if (power === 1) return logDensity(new PlaceFromOne(span * v)) + logSpan;
      const logV = Math.log(v);
      const logComplement = logSpan + power * logV;
      const complement = Math.exp(logComplement);
      const place = { x: 1 - complement, logX: Math.log1p(-complement), complement, logComplement };
      return logDensity(place) + Math.log(power) + logComplement - logV;
    },
  };
}

/** [from, to], 0 < from, in ln x: for densities that spread over decades. */
export function logarithmic(from: number, to: number, logDensity: LogDensity): Stretch {
  const logFrom = Math.log(from);
  const span = Math.log(to / from);
  return {
    from,
    to,
    isReversed: false,
    toX: (v) => Math.min(to, Math.max(from, from * Math.exp(span * v))),
    toV: (x) => Math.log(x / from) / span,
    logDensity(v) {
      const logX = logFrom + span * v;
      const x = Math.exp(logX);
      const place = { x, logX, complement: 1 - x, logComplement: Math.log1p(-x) };
      return logDensity(place) + Math.log(span) + logX;
    },
  };
}

/** [from, to] in x itself: for densities that are smooth up to both ends. */
export function linear(from: number, to: number, logDensity: LogDensity): Stretch {
  const span = to - from;
  const logSpan = Math.log(span);
  return {
    from,
    to,
    isReversed: false,
    toX: (v) => Math.min(to, from + span * v),
    toV: (x) => (x - from) / span,
    logDensity(v) {
      const x = from + span * v;
      const complement = 1 - to + span * (1 - v);
      const logComplement = Math.log(complement);
      return logDensity({ x, logX: Math.log(x), complement, logComplement }) + logSpan;
    },
  };
}
