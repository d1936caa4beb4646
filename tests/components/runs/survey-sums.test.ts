import { describe, expect, it } from 'vitest';
import { depthOf, profileAlong, sumBySurvey } from '@/components/runs/survey-sums';
import { viewPopulation } from '@/lib/inference';
import { populationWeights } from '@/lib/population';
import { buildSample, definition } from './sample';

const sample = buildSample();
const surveys = ['first', 'second'].map((id, position) => ({
  id,
  slug: id,
  name: id,
  position,
  entries: 30,
}));

describe('depth of search', () => {
  const weights = populationWeights(sample.grid, definition);
  const depth = depthOf(sumBySurvey(sample, surveys), weights);

  it('counts a star of two surveys once: weighed along the axis it gives the exposure', () => {
    let exposure = 0;
    for (const { depth: stars } of depth) {
      stars.forEach((value, column) => {
        exposure += value * weights.semiMajorAxis[column];
      });
    }
    const view = viewPopulation(sample.maps, sample.grid, definition);
    expect(exposure / view.exposure).toBeCloseTo(1, 9);
  });

  it('gives each survey the colour of its place', () => {
    expect(depth.map(({ seriesIndex }) => seriesIndex)).toEqual([0, 1]);
  });
});

describe('profileAlong', () => {
  it('is 1 inside the ranges of a map that sees everything', () => {
    const weights = populationWeights(sample.grid, definition);
    const everything = new Float64Array(weights.mass.length * weights.semiMajorAxis.length).fill(1);
    for (const seen of profileAlong(everything, weights, 'mass')) expect(seen).toBeCloseTo(1, 9);
  });
});
