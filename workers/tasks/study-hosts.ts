import { needsHostMass, type Population } from '@/lib/population';
import { TargetRow } from '@/models';
import { digestOf } from '@/models/digest';
import type { StudyWork } from './study-context';
import { currentStars } from './study-roots';

/**
 * Masses of the run's stars for a population that the run itself did not ask: what the run stored, or
 * what the targets say now, from the first survey in their order that gives one.
 *
 * @returns shape [star] [M_Sun], NaN where unknown
 */
export async function hostMassesUnder(
  { run, question, collaborationId, further }: StudyWork,
  populations: readonly Population[],
): Promise<Float64Array> {
  const { stars } = run.inputs;
  const isKnown = stars.some(({ hostMassMsun }) => hostMassMsun !== undefined);
  if (isKnown || !populations.some(needsHostMass)) return question.hostMassMsun;
  // Stars may have been joined since the run: their targets stand under the one that stayed.
  const current = await currentStars(stars.map(({ starId }) => starId));
  const rows = await TargetRow.findAll({
    attributes: ['starId', 'surveyId', 'hostMassMsun'],
    where: { collaborationId, starId: [...current.values()] },
  });
  const masses = Float64Array.from(stars, ({ starId, surveys }) => {
    for (const survey of surveys) {
      const row = rows.find((one) => one.starId === current.get(starId) && one.surveyId === survey);
      if (row?.hostMassMsun != null) return row.hostMassMsun;
    }
    return Number.NaN;
  });
  further.push({
    what: 'host masses',
    digest: digestOf(Array.from(masses, (mass) => (Number.isNaN(mass) ? null : mass))),
  });
  return masses;
}
