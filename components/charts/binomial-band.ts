import { logGamma } from '@/lib/numerics/special';

/**
 * Counts between which a binomial number lies with at least a probability, the same share left out on
 * either side at most.
 *
 * @param trials n, integer >= 1
 * @param chance of each, 0 < chance < 1
 * @param probability inside [fraction], 0 < probability < 1
 * @returns lowest and highest count of the band
 * @example binomialBand(4, 0.5, 0.8) // [1, 3]: each tail holds 0.0625
 */
export function binomialBand(
  trials: number,
  chance: number,
  probability: number,
): [number, number] {
  const tail = (1 - probability) / 2;
  const logPmf = (k: number) =>
    logGamma(trials + 1) -
    logGamma(k + 1) -
    logGamma(trials - k + 1) +
    k * Math.log(chance) +
    (trials - k) * Math.log1p(-chance);
  let low = 0;
  let below = Math.exp(logPmf(0));
  while (below <= tail) {
    low += 1;
    below += Math.exp(logPmf(low));
  }
  let high = trials;
  let above = Math.exp(logPmf(trials));
  while (above <= tail) {
    high -= 1;
    above += Math.exp(logPmf(high));
  }
  return [low, high];
}
