import { type PopulationView, viewPopulation } from '@/lib/inference';
import { type PopulationWeights, populationWeights } from '@/lib/population';
import type { PowerLawDefinition } from '@/lib/schemas/populations';
import { contract, type MovingAxis, weighContracted } from './contracted';
import type { LiveSample } from './live-sample';

const fieldsAlong = {
  mass: ['massMinMjup', 'massMaxMjup', 'massIndex'],
  semiMajorAxis: ['semiMajorAxisMinAu', 'semiMajorAxisMaxAu', 'semiMajorAxisIndex'],
} as const satisfies Record<MovingAxis, readonly (keyof PowerLawDefinition)[]>;

const otherAxis = { mass: 'semiMajorAxis', semiMajorAxis: 'mass' } as const;

const keyAlong = (definition: PowerLawDefinition, axis: MovingAxis) =>
  fieldsAlong[axis].map((field) => definition[field]).join();

/**
 * Views of one sample under populations that change step by step, as under a hand.
 *
 * While a control moves one axis alone, the maps are summed over the still axis once, and each
 * position costs one row a star instead of the whole map.
 */
export class LiveViews {
  private last: PowerLawDefinition | undefined;
  private held: { axis: MovingAxis; stillKey: string; contracted: Float64Array } | undefined;

  constructor(private readonly sample: LiveSample) {}

  /**
   * @returns the same as `viewPopulation` on the whole maps, up to the order of the sums
   * @throws RangeError where the population lies outside the maps
   */
  of(definition: PowerLawDefinition): PopulationView {
    const moving = this.movingAxis(definition);
    this.last = definition;
    if (moving === undefined) {
      return viewPopulation(this.sample.maps, this.sample.grid, definition);
    }
    const weights = populationWeights(this.sample.grid, definition);
    return viewContracted(this.contracted(definition, weights, moving), weights, {
      moving,
      definition,
    });
  }

  /** The axis that alone differs from the population before; undefined at first and otherwise. */
  private movingAxis(definition: PowerLawDefinition): MovingAxis | undefined {
    const { last, held } = this;
    if (last === undefined) return undefined;
    const isStill = (axis: MovingAxis) => keyAlong(last, axis) === keyAlong(definition, axis);
    if (isStill('mass') && isStill('semiMajorAxis')) return held?.axis;
    if (isStill('semiMajorAxis')) return 'mass';
    return isStill('mass') ? 'semiMajorAxis' : undefined;
  }

  private contracted(
    definition: PowerLawDefinition,
    weights: PopulationWeights,
    axis: MovingAxis,
  ): Float64Array {
    const stillKey = keyAlong(definition, otherAxis[axis]);
    if (this.held?.axis !== axis || this.held.stillKey !== stillKey) {
      this.held = { axis, stillKey, contracted: contract(this.sample, weights, axis) };
    }
    return this.held.contracted;
  }
}

/** A view from maps that are summed over the axis that stands still. */
export function viewContracted(
  contracted: Float64Array,
  weights: PopulationWeights,
  { moving, definition }: { moving: MovingAxis; definition: PowerLawDefinition },
): PopulationView {
  const completenessPerStar = weighContracted(contracted, weights[moving]);
  return {
    population: definition,
    completenessPerStar,
    numberSeenPerStar: null,
    rateScale: null,
    hostMassMsun: null,
    exposure: completenessPerStar.reduce((sum, one) => sum + one, 0),
    stars: completenessPerStar.length,
    shareOutsideMap: weights.shareOutsideMap,
  };
}
