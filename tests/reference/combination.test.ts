import { ratePosterior, upperLimit } from '@/lib/inference';
import { meanCompleteness, populationWeights } from '@/lib/population';
import {
  type CellMap,
  type CompletenessMap,
  combinationBounds,
  combineDeepest,
  combineIndependent,
  regridCells,
  regridNodes,
} from '@/lib/sensitivity';
import { runCheckFile } from './support/check-file';
import { checkedPopulation, type PopulationInputs } from './support/check-populations';

interface NodeMapInputs {
  masses_mjup: number[];
  axes_au: number[];
  values: number[][];
}

function nodeMap(inputs: NodeMapInputs): CompletenessMap {
  return {
    massMjup: Float64Array.from(inputs.masses_mjup),
    semiMajorAxisAu: Float64Array.from(inputs.axes_au),
    completeness: Float64Array.from(inputs.values.flat()),
  };
}

/** The same completeness everywhere, so that any node shows the rule. */
function flatMap(completeness: number): CompletenessMap {
  return nodeMap({
    masses_mjup: [1, 10],
    axes_au: [5, 50],
    values: [
      [completeness, completeness],
      [completeness, completeness],
    ],
  });
}

function rowsOf(values: Float64Array, columns: number): number[][] {
  return Array.from({ length: values.length / columns }, (_, i) =>
    Array.from(values.subarray(i * columns, (i + 1) * columns)),
  );
}

/** ∫∫ C d ln m d ln a over a map's cells. */
function cellIntegral(map: CellMap): number {
  const lengths = (edges: Float64Array) =>
    Array.from(edges.subarray(1), (edge, i) => Math.log(edge / edges[i]));
  const axes = lengths(map.semiMajorAxisEdgesAu);
  let total = 0;
  lengths(map.massEdgesMjup).forEach((mass, i) => {
    axes.forEach((axis, j) => {
      total += mass * axis * map.completeness[i * axes.length + j];
    });
  });
  return total;
}

/** No detections, flat prior without an end: the limit is -ln(1 - level)/S. */
const posteriorOf = (stars: number, completeness: number) =>
  ratePosterior({
    likelihood: 'mean-number',
    completeness: new Float64Array(stars).fill(completeness),
    detectedStars: [],
    prior: { law: 'gamma', shape: 1, rate: 0 },
  });

const populationMean = ({
  map,
  population,
}: {
  map: NodeMapInputs;
  population: PopulationInputs;
}) => {
  const star = nodeMap(map);
  return meanCompleteness(
    star.completeness,
    populationWeights(star, checkedPopulation(population)),
  );
};

runCheckFile('combination', {
  runners: {
    'combined completeness': ({ completeness }) => {
      const maps = completeness.map(flatMap);
      const { lower, upper } = combinationBounds(maps);
      return {
        independent: combineIndependent(maps).completeness[0],
        deepest: combineDeepest(maps).completeness[0],
        lower_bound: lower.completeness[0],
        upper_bound: upper.completeness[0],
      };
    },
    'each of ': ({ stars, completeness, copies, level }) => {
      const once = posteriorOf(stars, completeness);
      const again = posteriorOf(stars * copies, completeness);
      const wrongLimit = upperLimit(again, level);
      return {
        limit_counted_once: upperLimit(once, level),
        limit_counted_again: wrongLimit,
        true_confidence_of_wrong_limit: once.cumulative(wrongLimit),
      };
    },
    'regrid node map': ({ map, new_masses_mjup: masses, new_axes_au: axes }) => {
      const regridded = regridNodes(nodeMap(map), {
        massMjup: Float64Array.from(masses),
        semiMajorAxisAu: Float64Array.from(axes),
      });
      return {
        values: rowsOf(regridded.map.completeness, axes.length),
        fraction_of_nodes_outside: regridded.shareOutside,
      };
    },
    'regrid cell map': ({ map, new_mass_edges_mjup: masses, new_axis_edges_au: axes }) => {
      const before: CellMap = {
        massEdgesMjup: Float64Array.from(map.mass_edges_mjup),
        semiMajorAxisEdgesAu: Float64Array.from(map.axis_edges_au),
        completeness: Float64Array.from(map.values.flat()),
      };
      const after = regridCells(before, Float64Array.from(masses), Float64Array.from(axes)).map;
      return {
        values: rowsOf(after.completeness, axes.length - 1),
        integral_before: cellIntegral(before),
        integral_after: cellIntegral(after),
      };
    },
    'mean completeness under ': populationMean,
  },
});
