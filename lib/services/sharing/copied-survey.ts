import type { Transaction } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { enqueueMaps, holdMaps } from '@/lib/queue/enqueue';
import { CoolingTableRow, type ShareRow, SurveyRow } from '@/models';
import type { SharedContent } from './content';
import { copyMaps } from './copied-maps';
import { keepTargets } from './copied-targets';

const LONGEST_SURVEY_NAME = 60;
const LONGEST_TABLE_NAME = 100;

/** The first of the candidates that nothing has yet. */
async function firstFree(
  candidates: (attempt: number) => string,
  isTaken: (name: string) => Promise<boolean>,
): Promise<string> {
  for (let attempt = 1; ; attempt++) {
    const name = candidates(attempt);
    if (!(await isTaken(name))) return name;
  }
}

const withTail = (name: string, tail: string, longest: number) =>
  name.slice(0, longest - tail.length) + tail;

/** The cooling table that the shared maps rest on; one with the same values is the same table. */
async function keepCooling(
  share: ShareRow,
  { coolingTable, survey }: SharedContent,
  transaction: Transaction,
): Promise<SurveyRow['mapSettings']> {
  const { mapSettings } = survey;
  if (!coolingTable) return { ...mapSettings, cooling: { kind: 'built-in' } };
  const { receiverId: collaborationId } = share;
  const { name, massMjup, ageMyr, magnitudes, digest, startCondition } = coolingTable;
  const same = await CoolingTableRow.findOne({ where: { collaborationId, digest }, transaction });
  const table =
    same ??
    (await CoolingTableRow.create(
      {
        ...{ collaborationId, massMjup, ageMyr, magnitudes, digest, startCondition },
        name: await firstFree(
          (attempt) =>
            attempt === 1
              ? name
              : withTail(name, ` (${share.ownerName.slice(0, 50)} ${attempt})`, LONGEST_TABLE_NAME),
          async (wanted) =>
            (await CoolingTableRow.count({
              where: { collaborationId, name: wanted },
              transaction,
            })) > 0,
        ),
      },
      { transaction },
    ));
  return { ...mapSettings, cooling: { kind: 'table', coolingTableId: table.id } };
}

async function createSurvey(
  share: ShareRow,
  content: SharedContent,
  mapSettings: SurveyRow['mapSettings'],
  transaction: Transaction,
): Promise<SurveyRow> {
  const { receiverId: collaborationId } = share;
  const { slug, name, ...told } = content.survey;
  const count = (where: object) =>
    SurveyRow.count({ where: { collaborationId, ...where }, transaction });
  const tail = (attempt: number) =>
    attempt === 1 ? '' : ` (shared${attempt > 2 ? ` ${attempt - 1}` : ''})`;
  return SurveyRow.create(
    {
      ...told,
      collaborationId,
      shareId: share.id,
      slug: await firstFree(
        (attempt) => (attempt === 1 ? slug : withTail(slug, `-shared-${attempt}`, 39)),
        async (wanted) => (await count({ slug: wanted })) > 0,
      ),
      name: await firstFree(
        (attempt) => withTail(name, tail(attempt), LONGEST_SURVEY_NAME),
        async (wanted) => (await count({ name: wanted })) > 0,
      ),
      mapSettings,
      position: await count({}),
    },
    { transaction },
  );
}

/**
 * Makes the receiver's copy of what is shared, or brings it to the source's state.
 *
 * A copy, not a reference: every table is walled in by its collaboration, and rows read across that
 * wall would have to be let through in each query of samples, maps, runs and exports. One forgotten
 * place would show what was not offered. A copy holds what was offered and nothing else, its runs
 * can be repeated after a withdrawal of the source, and its star may be joined to the receiver's.
 * The price is that a change of the source arrives only when somebody refreshes.
 */
export async function keepCopy(
  actor: Pick<Actor, 'personId'>,
  share: ShareRow,
  content: SharedContent,
  transaction: Transaction,
): Promise<SurveyRow> {
  const { collaborationId: from, receiverId: to, scope } = share;
  const mapSettings = await keepCooling(share, content, transaction);
  const there = await SurveyRow.findOne({ where: { shareId: share.id }, transaction });
  const { slug, name, ...told } = content.survey;
  if (there) await holdMaps(transaction, there.id);
  const survey = there
    ? await there.update({ ...told, mapSettings }, { transaction })
    : await createSurvey(share, content, mapSettings, transaction);
  const maps = content.targets.flatMap(({ map }) => map ?? []);
  await copyMaps(from as string, to, maps, scope, transaction);
  await keepTargets(share, survey, content, transaction);
  // The receiver may have adopted other ages: maps that are current already stay as they are.
  if (content.targets.some(({ curves }) => curves.length > 0)) {
    await enqueueMaps(transaction, {
      collaborationId: to,
      surveyId: survey.id,
      requestedBy: actor.personId,
    });
  }
  await share.update({ sourceVersion: content.version, copiedAt: new Date() }, { transaction });
  return survey;
}
