import type { StudyPerformer } from './study-context';
import { collectPlanned } from './study-planned';

/** What a planned survey would give, seen from the run. */
export const performForecast: StudyPerformer<'forecast'> = async (given, settings) => {
  const { notes, ...planned } = await collectPlanned(given, settings.planned);
  const { assumedRate, wantedLimit } = settings;
  await given.report('forecast', 0, 1);
  const answer = await given.compute('forecast', {
    question: given.question,
    planned,
    count: settings.planned.kind === 'targets' ? undefined : settings.planned.count,
    assumedRate,
    wantedLimit,
  });
  await given.report('forecast', 1, 1);
  return { kind: 'forecast', ...answer, notes: [...notes, ...answer.notes] };
};
