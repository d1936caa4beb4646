import {
  type ContractedMaps,
  completenessWhileMoving,
  contractStillAxis,
  type PopulationView,
  viewPopulation,
} from '@/lib/inference';
import {
  type MovingAxis,
  type PopulationWeights,
  populationWeights,
  weightsWhileMoving,
} from '@/lib/population';
import type { PowerLawDefinition } from '@/lib/schemas/populations';
import type { LiveSample } from './live-sample';

const fieldsAlong = {
  mass: ['massMinMjup', 'massMaxMjup', 'massIndex'],
  semiMajorAxis: ['semiMajorAxisMinAu', 'semiMajorAxisMaxAu', 'semiMajorAxisIndex'],
} as const satisfies Record<MovingAxis, readonly (keyof PowerLawDefinition)[]>;

export const otherAxis = { mass: 'semiMajorAxis', semiMajorAxis: 'mass' } as const;

const keyAlong = (definition: PowerLawDefinition, axis: MovingAxis) =>
  fieldsAlong[axis].map((field) => definition[field]).join();

/** What the movement of one axis leaves as it is. */
interface Held {
  axis: MovingAxis;
  stillKey: string;
  weights: PopulationWeights;
  contracted: ContractedMaps;
}

/**
 * Views of one sample under populations that change step by step, as under a hand.
 *
 * While a control moves one axis alone, the maps are summed over the still axis once, and each
 * position costs one row a star instead of the whole map.
 */
export class LiveViews {
  private last: PowerLawDefinition | undefined;
  private held: Held | undefined;

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
    const { weights, contracted } = this.hold(definition, moving);
    const moved = weightsWhileMoving(this.sample.grid, definition, moving, weights);
    return viewContracted(contracted, moved, definition);
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

  private hold(definition: PowerLawDefinition, axis: MovingAxis): Held {
    const still = otherAxis[axis];
    const stillKey = keyAlong(definition, still);
    if (this.held?.axis !== axis || this.held.stillKey !== stillKey) {
      const { maps, grid } = this.sample;
      const weights = populationWeights(grid, definition);
      const contracted = contractStillAxis(maps, grid, axis, weights[still]);
      this.held = { axis, stillKey, weights, contracted };
    }
    return this.held;
  }
}

/** A view from maps that are summed over the axis that stands still. */
export function viewContracted(
  contracted: ContractedMaps,
  weights: PopulationWeights,
  definition: PowerLawDefinition,
): PopulationView {
  const completenessPerStar = completenessWhileMoving(contracted, weights[contracted.moving]);
  let exposure = 0;
  for (const one of completenessPerStar) exposure += one;
  return {
    population: definition,
    completenessPerStar,
    numberSeenPerStar: null,
    rateScale: null,
    hostMassMsun: null,
    exposure,
    stars: completenessPerStar.length,
    shareOutsideMap: weights.shareOutsideMap,
  };
}
