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
import type { MapGrid } from '@/lib/sensitivity';
import type { LiveSample } from './live-sample';
import { stacksUnder } from './live-stacks';
import type { Under } from './under';

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
 * Views of one sample under populations that change step by step, as under a hand, and under the ages
 * and cooling models for which it has maps.
 */
export class LiveViews {
  private readonly stacks = new Map<Uint16Array, StackViews>();

  constructor(private readonly sample: LiveSample) {}

  /**
   * @returns the same as `viewPopulation` on the whole maps, up to the order of the sums; between two
   *   stored shifts of age the mean of both, weighted
   * @throws RangeError where the population lies outside the maps, or there are none
   */
  of(definition: PowerLawDefinition, under: Under = {}): PopulationView {
    const parts = stacksUnder(this.sample, under).map(({ maps, share }) => ({
      share,
      view: this.stackOf(maps).of(definition),
    }));
    return parts.length === 1 ? parts[0].view : weighViews(parts);
  }

  private stackOf(maps: Uint16Array): StackViews {
    const known = this.stacks.get(maps) ?? new StackViews(maps, this.sample.grid);
    this.stacks.set(maps, known);
    return known;
  }
}

/** A mean over the population is linear in the map, so views may be weighed in place of maps. */
function weighViews(parts: { share: number; view: PopulationView }[]): PopulationView {
  const [{ view: first }] = parts;
  const perStar = new Float64Array(first.stars);
  for (const { share, view } of parts) {
    view.completenessPerStar?.forEach((seen, star) => {
      perStar[star] += share * seen;
    });
  }
  const exposure = perStar.reduce((sum, seen) => sum + seen, 0);
  return { ...first, completenessPerStar: perStar, exposure };
}

/**
 * Views of one stack of maps.
 *
 * While a control moves one axis alone, the maps are summed over the still axis once, and each
 * position costs one row a star instead of the whole map. A population that stands still costs nothing.
 */
class StackViews {
  private last: { definition: PowerLawDefinition; view: PopulationView } | undefined;
  private held: Held | undefined;

  constructor(
    private readonly maps: Uint16Array,
    private readonly grid: MapGrid,
  ) {}

  of(definition: PowerLawDefinition): PopulationView {
    if (this.last && isSameAlongBoth(this.last.definition, definition)) return this.last.view;
    const view = this.look(definition);
    this.last = { definition, view };
    return view;
  }

  private look(definition: PowerLawDefinition): PopulationView {
    const moving = this.movingAxis(definition);
    if (moving === undefined) return viewPopulation(this.maps, this.grid, definition);
    const { weights, contracted } = this.hold(definition, moving);
    const moved = weightsWhileMoving(this.grid, definition, moving, weights);
    return viewContracted(contracted, moved, definition);
  }

  /** The axis that alone differs from the population before; undefined at first and otherwise. */
  private movingAxis(definition: PowerLawDefinition): MovingAxis | undefined {
    if (this.last === undefined) return undefined;
    const before = this.last.definition;
    const isStill = (axis: MovingAxis) => keyAlong(before, axis) === keyAlong(definition, axis);
    if (isStill('semiMajorAxis')) return 'mass';
    return isStill('mass') ? 'semiMajorAxis' : undefined;
  }

  private hold(definition: PowerLawDefinition, axis: MovingAxis): Held {
    const still = otherAxis[axis];
    const stillKey = keyAlong(definition, still);
    if (this.held?.axis !== axis || this.held.stillKey !== stillKey) {
      const weights = populationWeights(this.grid, definition);
      const contracted = contractStillAxis(this.maps, this.grid, axis, weights[still]);
      this.held = { axis, stillKey, weights, contracted };
    }
    return this.held;
  }
}

const isSameAlongBoth = (one: PowerLawDefinition, other: PowerLawDefinition) =>
  (['mass', 'semiMajorAxis'] as const).every(
    (axis) => keyAlong(one, axis) === keyAlong(other, axis),
  );

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
