import type { DepthSeries } from '@/components/charts/depth-chart';
import type { PopulationWeights } from '@/lib/population';
import type { DrawnInputs } from '@/lib/schemas/runs';
import type { LiveSample } from './live-sample';

/** Maps summed over the stars of each survey; a star of several is shared out among them. */
export interface SurveySum {
  survey: DrawnInputs['surveys'][number];
  /** Shape [mass, semi-major axis] [stars]. */
  summed: Float64Array;
}

export function sumBySurvey(sample: LiveSample, surveys: DrawnInputs['surveys']): SurveySum[] {
  const size = sample.grid.massMjup.length * sample.grid.semiMajorAxisAu.length;
  const sums = surveys.map((survey) => ({ survey, summed: new Float64Array(size) }));
  sample.stars.forEach((star, index) => {
    const map = sample.maps.subarray(index * size, (index + 1) * size);
    for (const { survey, summed } of sums) {
      if (!star.surveys.includes(survey.id)) continue;
      const scale = 1 / (65_535 * star.surveys.length);
      for (let node = 0; node < size; node++) summed[node] += scale * map[node];
    }
  });
  return sums;
}

/** The mean map of all stars, from the sums in which each star counts once. */
export function meanOfSums(sums: SurveySum[], stars: number): Float64Array {
  const mean = new Float64Array(sums[0]?.summed.length ?? 0);
  for (const { summed } of sums)
    summed.forEach((sum, node) => {
      mean[node] += sum / stars;
    });
  return mean;
}

/** Depth of search of each survey against semi-major axis, averaged over the population's masses. */
export function depthOf(sums: SurveySum[], weights: PopulationWeights): DepthSeries[] {
  const whole = weights.mass.reduce((sum, weight) => sum + weight, 0);
  const columns = weights.semiMajorAxis.length;
  return sums.map(({ survey, summed }) => {
    const depth = new Float64Array(columns);
    weights.mass.forEach((weight, row) => {
      if (weight === 0) return;
      for (let column = 0; column < columns; column++) {
        depth[column] += (weight * summed[row * columns + column]) / whole;
      }
    });
    return { name: survey.name, seriesIndex: survey.position, depth };
  });
}

/** What could be seen along one axis: the mean map averaged over the other one's law [fraction]. */
export function profileAlong(
  completeness: Float64Array,
  weights: PopulationWeights,
  axis: 'mass' | 'semiMajorAxis',
): Float64Array {
  const rows = weights.mass.length;
  const columns = weights.semiMajorAxis.length;
  const along = new Float64Array(axis === 'mass' ? rows : columns);
  for (let row = 0; row < rows; row++) {
    for (let column = 0; column < columns; column++) {
      const seen = completeness[row * columns + column];
      if (axis === 'mass') along[row] += seen * weights.semiMajorAxis[column];
      else along[column] += seen * weights.mass[row];
    }
  }
  return along;
}
