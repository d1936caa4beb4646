import type { StudyPerformer } from './study-context';

/** The limit at every node of the run's grid. */
export const performLimitMap: StudyPerformer<'limit-map'> = async (given, settings) => {
  const { question } = given;
  await given.report('limits', 0, 1);
  const { tailCumulative } = settings;
  const result = await given.compute('limit-map', { question, tailCumulative });
  await given.report('limits', 1, 1);
  return result;
};

/** The limit against a parameter of the run's population. */
export const performSweep: StudyPerformer<'sweep'> = async (given, settings) => {
  const { question } = given;
  await given.report('limits', 0, 1);
  const result = await given.compute('sweep', { question, settings });
  await given.report('limits', 1, 1);
  return result;
};
