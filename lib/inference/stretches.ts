import type { Stretch } from './integrated-density';

/**
 * ln of an unnormalised density per dx. The logarithms of x and of 1 - x come along, because near
 * a singular end x itself has lost them.
 */
export type LogDensity = (x: number, logX: number, logComplement: number) => number;

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
    toX: (v) => to * v ** power,
    toV: (x) => (x / to) ** (1 / power),
    logDensity(v) {
      const logV = Math.log(v);
      const logX = logTo + power * logV;
      const x = power === 1 ? to * v : Math.exp(logX);
      return logDensity(x, logX, Math.log1p(-x)) + Math.log(power) + logX - logV;
    },
  };
}

/** [from, 1] in 1 - x = (1 - from)(1 - v)^m, for a density (1 - x)^(exponent - 1) at 1. */
export function toOne(from: number, exponent: number, logDensity: LogDensity): Stretch {
  const power = smoothingPower(exponent);
  const span = 1 - from;
  return {
    from,
    to: 1,
    toX: (v) => 1 - span * (1 - v) ** power,
    toV: (x) => 1 - ((1 - x) / span) ** (1 / power),
    logDensity(v) {
      const logRest = Math.log1p(-v);
      const logComplement = Math.log(span) + power * logRest;
      const complement = Math.exp(logComplement);
      const x = 1 - complement;
      const logX = Math.log1p(-complement);
      return logDensity(x, logX, logComplement) + Math.log(power) + logComplement - logRest;
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
    toX: (v) => Math.min(to, Math.max(from, from * Math.exp(span * v))),
    toV: (x) => Math.log(x / from) / span,
    logDensity(v) {
      const logX = logFrom + span * v;
      const x = Math.exp(logX);
      return logDensity(x, logX, Math.log1p(-x)) + Math.log(span) + logX;
    },
  };
}
