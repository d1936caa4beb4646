import { Op } from 'sequelize';
import type { Actor } from '@/lib/access/actor';
import { Conflict, NotFound } from '@/lib/errors';
import type { WrittenMaps } from '@/lib/formats';
import {
  CompanionObservationRow,
  CompanionRow,
  CompletenessMapRow,
  type SurveyRow,
  TargetRow,
} from '@/models';
import { findSurvey } from '../surveys';
import { asItStands, type CollectionFiles } from './collection-files';
import { runTables } from './run-tables';
import { mapsInOrder } from './stored-maps';
import {
  companionsTable,
  targetsTable,
  writtenCompanion,
  writtenEpochs,
  writtenTarget,
} from './written-rows';

const targetsOf = (survey: SurveyRow) =>
  TargetRow.findAll({ where: { surveyId: survey.id }, order: [['foldedName', 'ASC']] });

const axesOf = (row: Pick<CompletenessMapRow, 'massMjup' | 'semiMajorAxisAu'>) =>
  JSON.stringify([row.massMjup, row.semiMajorAxisAu]);

/** The ready maps of a survey as one array: they must stand on one grid. */
async function mapsOfSurvey(
  survey: SurveyRow,
  format: WrittenMaps['format'],
): Promise<WrittenMaps> {
  const targets = await TargetRow.findAll({
    where: { surveyId: survey.id, mapState: 'ready', mapId: { [Op.ne]: null } },
    order: [['foldedName', 'ASC']],
  });
  if (targets.length === 0) throw new Conflict('This survey has no map yet');
  const rows = await CompletenessMapRow.findAll({
    attributes: ['id', 'massMjup', 'semiMajorAxisAu'],
    where: {
      collaborationId: survey.collaborationId,
      id: targets.flatMap(({ mapId }) => mapId ?? []),
    },
  });
  const grids = new Set(rows.map(axesOf));
  if (grids.size > 1) {
    throw new Conflict(
      `The maps of ${survey.name} stand on ${grids.size} different grids, and one array has one: take the maps one by one, or those of a run, which are on its grid`,
    );
  }
  const [{ massMjup, semiMajorAxisAu }] = rows;
  return {
    title: `Completeness maps of ${survey.name}`,
    massMjup,
    semiMajorAxisAu,
    targets: targets.map(({ name }) => name),
    isCube: true,
    format,
    provenance: asItStands(`survey ${survey.name} (${survey.slug})`),
    maps: () =>
      mapsInOrder(
        survey.collaborationId,
        targets.map(({ mapId }) => mapId as string),
        null,
      ),
  };
}

/** Files of a survey: what was imported, in a form that can be imported again, and its maps. */
export async function surveyFiles(actor: Actor, slug: string): Promise<CollectionFiles> {
  const survey = await findSurvey(actor, slug);
  const provenance = asItStands(`survey ${survey.name} (${survey.slug})`);
  return {
    stem: survey.slug,
    audited: { kind: 'survey', id: survey.id },
    tables: {
      targets: {
        what: 'Targets as they can be imported again',
        latex: { columns: ['name', 'spectral_type', 'distance', 'age', 'mass', 'moving_group'] },
        build: async () =>
          targetsTable(
            { name: 'targets', title: `Targets of ${survey.name}`, provenance },
            (await targetsOf(survey)).map(writtenTarget),
          ),
      },
      companions: {
        what: 'Companions and candidates, a row an epoch, as they can be imported again',
        latex: {
          columns: runTables.companions.latex.columns.filter(
            (name) => name !== 'used' && name !== 'reason',
          ),
        },
        build: async () => {
          const targets = await targetsOf(survey);
          const nameOf = new Map(targets.map(({ id, name }) => [id, name]));
          const rows = await CompanionRow.findAll({
            where: { targetId: targets.map(({ id }) => id) },
          });
          const place = new Map(targets.map(({ id }, i) => [id, i]));
          rows.sort(
            (a, b) =>
              (place.get(a.targetId) ?? 0) - (place.get(b.targetId) ?? 0) ||
              (a.foldedName < b.foldedName ? -1 : 1),
          );
          const observations = await CompanionObservationRow.findAll({
            where: { companionId: rows.map((row) => row.id) },
            order: [
              ['observedOn', 'ASC'],
              ['band', 'ASC'],
            ],
          });
          return companionsTable(
            { name: 'companions', title: `Companions of ${survey.name}`, provenance },
            rows.flatMap((row) =>
              writtenEpochs(
                writtenCompanion(row, nameOf.get(row.targetId) ?? ''),
                observations.filter(({ companionId }) => companionId === row.id),
              ),
            ),
          );
        },
      },
    },
    maps: {
      what: 'Completeness map of every target that has one',
      endings: ['npz', 'npy', 'h5', 'fits'],
      open: ({ precision }) => mapsOfSurvey(survey, precision),
    },
  };
}

/** Files of one stored map. */
export async function mapFiles(actor: Actor, id: string): Promise<CollectionFiles> {
  const { collaborationId } = actor;
  const isId = /^[0-9a-f-]{36}$/.test(id);
  const row = isId
    ? await CompletenessMapRow.findOne({
        attributes: { exclude: ['nodeValues'] },
        where: { id, collaborationId },
      })
    : null;
  if (!row) throw new NotFound('completeness map');
  const target = await TargetRow.findOne({ where: { collaborationId, mapId: id } });
  const words = target ? `map of ${target.name}` : 'map';
  return {
    stem: target ? target.name.replaceAll(/[^\p{L}\p{N}]+/gu, '-').replace(/^-|-$/g, '') : 'map',
    audited: { kind: 'map', id },
    tables: {},
    maps: {
      what: `Completeness ${words}`,
      endings: ['npz', 'npy', 'h5', 'fits', 'json'],
      open: async ({ precision }) => ({
        title: `Completeness ${words}`,
        massMjup: row.massMjup,
        semiMajorAxisAu: row.semiMajorAxisAu,
        targets: target ? [target.name] : null,
        isCube: false,
        format: precision,
        provenance: [
          ...asItStands(words),
          ['map_digest', row.digest],
          ['map_checksum', row.checksum],
          ['engine', row.engineVersion],
          ['origin', row.origin],
        ],
        maps: () => mapsInOrder(collaborationId, [id], null),
      }),
    },
  };
}
