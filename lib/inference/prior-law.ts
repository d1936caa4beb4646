/**
 * A prior as the posterior needs it: x^(exponentAtZero - 1) (1 - x)^(exponentAtOne - 1) times
 * exp(logRegular(x)) on the support. The powers stay apart so that they join the likelihood's.
 */
export interface PriorLaw {
  support: [number, number];
  exponentAtZero: number;
  exponentAtOne: number;
  /** ln of what is left without the powers: finite on the whole support. */
  logRegular(x: number, complement: number): number;
  /** Rate of the exponential decay of an unbounded prior [stars]. */
  decay: number;
  /** ln of the integral; null if it has none, 'numerical' where only quadrature gives it. */
  logNorm: number | null | 'numerical';
  /** Ends of the pieces in which the density is smooth, the support's own among them. */
  breaks?: number[];
}
