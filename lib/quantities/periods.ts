import { ASTRONOMICAL_UNIT, GM_SUN, SECONDS_PER_DAY } from './constants';

/**
 * Orbital period, P = 2π √(a³/(G M)). The companion's mass is neglected, which the screen must say
 * (0.5 % of P at 10 M_Jup around 1 M_Sun).
 *
 * @param semiMajorAxisAu a, [au], > 0
 * @param hostMassMsun M, [M_Sun], > 0
 * @returns P, [d]
 * @throws RangeError for an argument that is not > 0
 * @example periodDays(1, 1) // 365.256898
 */
export function periodDays(semiMajorAxisAu: number, hostMassMsun: number): number {
  requirePositive(semiMajorAxisAu, 'semiMajorAxisAu');
  requirePositive(hostMassMsun, 'hostMassMsun');
  const axisM = semiMajorAxisAu * ASTRONOMICAL_UNIT.value;
  return (2 * Math.PI * Math.sqrt(axisM ** 3 / (GM_SUN.value * hostMassMsun))) / SECONDS_PER_DAY;
}

/**
 * Semi-major axis of a period, the inverse of periodDays.
 *
 * @param days P, [d], > 0
 * @param hostMassMsun M, [M_Sun], > 0
 * @returns a, [au]
 * @throws RangeError for an argument that is not > 0
 */
export function semiMajorAxisAuOfPeriod(days: number, hostMassMsun: number): number {
  requirePositive(days, 'days');
  requirePositive(hostMassMsun, 'hostMassMsun');
  const angular = (days * SECONDS_PER_DAY) / (2 * Math.PI);
  return Math.cbrt(GM_SUN.value * hostMassMsun * angular ** 2) / ASTRONOMICAL_UNIT.value;
}

function requirePositive(value: number, name: string): void {
  if (!(value > 0 && Number.isFinite(value))) {
    throw new RangeError(`${name} must be finite and > 0, got ${value}`);
  }
}
