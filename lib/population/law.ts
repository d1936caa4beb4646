/**
 * How companions are spread along one axis (mass or semi-major axis): the contract of a law.
 *
 * A new law is one file that returns an AxisLaw, and one line in `forms.ts`. Everything is per
 * d ln x and unnormalised: weights, densities and draws divide by `integral` over the box.
 */
export interface AxisLaw {
  /** Shape at x > 0, per d ln x, >= 0 [any unit]. */
  shape(x: number): number;
  /** Integral of the shape over d ln x from `from` to `to`, 0 < from <= to. */
  integral(from: number, to: number): number;
  /** x below which the fraction p, 0..1, of the law on [from, to] lies. */
  quantile(p: number, from: number, to: number): number;
  /** Places inside the box where the shape has a kink: quadrature is cut there. */
  breaks: readonly number[];
}

/** One axis of a population: its law and the cutoffs of the box. */
export interface BoundedLaw {
  law: AxisLaw;
  min: number;
  max: number;
}
