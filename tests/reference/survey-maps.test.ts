import { computeCompletenessMap } from '@/lib/sensitivity';
import { readChecks, runCheckFile } from './support/check-file';
import {
  type CurveInputs,
  contrastCurve,
  type LawInputs,
  type StarCheckInputs,
  sensitivitySettings,
  starInputs,
} from './support/check-inputs';

interface Survey {
  masses_mjup: number[];
  axes_au: number[];
  stars: (StarCheckInputs & { curve: string; offset_mag?: number })[];
  curves: Record<string, CurveInputs>;
  options: Record<
    string,
    {
      rule: 'hard' | 'smooth';
      n_sigma: number;
      age_nodes_per_half: number;
      eccentricity: LawInputs;
    }
  >;
}

const survey = readChecks('survey-maps')[0].inputs as unknown as Survey;

function mapOf(starName: string, optionName: string): number[][] {
  const star = survey.stars.find(({ name }) => name === starName);
  const option = survey.options[optionName];
  if (star === undefined) throw new Error(`no star ${starName} in the survey`);
  const curve = contrastCurve(
    survey.curves[star.curve],
    star.band,
    option.n_sigma,
    star.offset_mag ?? 0,
  );
  const grid = {
    massMjup: Float64Array.from(survey.masses_mjup),
    semiMajorAxisAu: Float64Array.from(survey.axes_au),
  };
  const { map } = computeCompletenessMap(
    starInputs(star, [curve], option.age_nodes_per_half === 0),
    { kind: 'built-in' },
    grid,
    sensitivitySettings(option.eccentricity, option.rule, option.age_nodes_per_half),
  );
  const columns = survey.axes_au.length;
  return survey.masses_mjup.map((_, i) =>
    Array.from(map.completeness.subarray(i * columns, (i + 1) * columns)),
  );
}

runCheckFile('survey-maps', {
  runners: {
    setup: () => ({ stars: survey.stars.length }),
    'map plain': ({ star, option }) => mapOf(star, option),
    'map full': ({ star, option }) => mapOf(star, option),
  },
});
