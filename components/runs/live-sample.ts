import type { FetchedStack } from '@/components/hooks/use-ages-cooling';
import type { StarMaps } from '@/components/hooks/use-run-maps';
import type { Detection, OpenCandidate } from '@/lib/inference';
import type { DrawnInputs } from '@/lib/schemas/runs';
import { COOLING_AS_RUN } from '@/lib/schemas/stack-choices';
import type { AgesCoolingAnswer } from '@/lib/schemas/studies';
import type { MapGrid } from '@/lib/sensitivity';

/** Maps of a sample's stars under other ages and cooling models. */
export interface FurtherMaps {
  /** Of every star, in sigma of its own age, increasing. */
  ageShifts: number[];
  /** `as-run` first. */
  models: string[];
  /** By model, then by shift; each as the sample's own. Undefined: not fetched, or not to be made. */
  stacks: (Uint16Array | undefined)[][];
}

/** What a run was made from, as the live controls need it. */
export interface LiveSample {
  grid: MapGrid;
  stars: DrawnInputs['stars'];
  /** Shape [star, mass, semi-major axis], completeness times 65535. */
  maps: Uint16Array;
  /** The same under other ages and cooling models, where a run's answer keeps some. */
  further?: FurtherMaps;
  /** Confirmed companions of these stars, inside the ranges or not. */
  companions: Detection[];
  /** Candidates without an answer, inside the ranges or not. */
  open: OpenCandidate[];
}

/** Stored stacks beside the run's own maps, in the order of an answer about ages and cooling. */
export function furtherOf(
  { result }: AgesCoolingAnswer,
  maps: StarMaps,
  stacks: readonly FetchedStack[],
): FurtherMaps {
  const { ageShifts, models } = result;
  const find = (cooling: string, age: number) =>
    cooling === COOLING_AS_RUN && age === 0
      ? maps.values
      : stacks.find((one) => one.cooling === cooling && one.age === age)?.maps;
  return {
    ageShifts,
    models: models.map(({ model }) => model),
    stacks: models.map(({ model }) => ageShifts.map((age) => find(model, age))),
  };
}

export function sampleOf(inputs: DrawnInputs, maps: StarMaps, further?: FurtherMaps): LiveSample {
  const indexOf = new Map(inputs.stars.map((star, index) => [star.starId, index]));
  return {
    grid: { massMjup: maps.massMjup, semiMajorAxisAu: maps.semiMajorAxisAu },
    stars: inputs.stars,
    maps: maps.values,
    ...(further && { further }),
    companions: inputs.companions.flatMap(({ starId, name, massMjup, semiMajorAxisAu }) => {
      const star = indexOf.get(starId);
      return star === undefined ? [] : [{ star, name, massMjup, semiMajorAxisAu }];
    }),
    open: inputs.undecided.flatMap((one) => {
      const star = indexOf.get(one.starId ?? '');
      const { name, probability = null, massMjup = null, semiMajorAxisAu = null } = one;
      return star === undefined ? [] : [{ star, name, probability, massMjup, semiMajorAxisAu }];
    }),
  };
}

/** The sample without some of its stars: what the chosen surveys alone would give. */
export function restrictSample(
  sample: LiveSample,
  keep: (star: LiveSample['stars'][number]) => boolean,
): LiveSample {
  const kept = sample.stars.flatMap((star, index) => (keep(star) ? [index] : []));
  const size = sample.grid.massMjup.length * sample.grid.semiMajorAxisAu.length;
  const maps = new Uint16Array(kept.length * size);
  const movedTo = new Map<number, number>();
  kept.forEach((from, to) => {
    maps.set(sample.maps.subarray(from * size, (from + 1) * size), to * size);
    movedTo.set(from, to);
  });
  const moved = <Item extends { star: number }>(items: Item[]): Item[] =>
    items.flatMap((item) => {
      const star = movedTo.get(item.star);
      return star === undefined ? [] : [{ ...item, star }];
    });
  return {
    grid: sample.grid,
    stars: kept.map((index) => sample.stars[index]),
    maps,
    companions: moved(sample.companions),
    open: moved(sample.open),
  };
}
