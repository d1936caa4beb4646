import { runCheckFile } from './support/check-file';
import { computedMap, surveyGrid, surveyInputs, surveyStars } from './support/check-survey';

function mapOf(starName: string, optionName: string): number[][] {
  const { stars, settings } = surveyInputs(optionName);
  const star = stars.find(({ name }) => name === starName);
  if (star === undefined) throw new Error(`no star ${starName} in the survey`);
  const map = computedMap(star, settings);
  const columns = surveyGrid.semiMajorAxisAu.length;
  return Array.from(surveyGrid.massMjup, (_, i) =>
    Array.from(map.subarray(i * columns, (i + 1) * columns)),
  );
}

runCheckFile('survey-maps', {
  runners: {
    setup: () => ({ stars: surveyStars.length }),
    'map plain': ({ star, option }) => mapOf(star, option),
    'map full': ({ star, option }) => mapOf(star, option),
  },
});
