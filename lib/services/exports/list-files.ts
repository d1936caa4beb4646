import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { NotFound } from '@/lib/errors';
import { starDefinitions, tableOfRows, type WrittenCell } from '@/lib/formats';
import { sampleDefinitionSchema } from '@/lib/schemas/samples';
import type { StarEntry, StarView } from '@/lib/schemas/stars';
import { PopulationRow, TargetRow } from '@/models';
import { findLeftOut } from '@/models/sample-selection';
import { readEntries } from '../sample-preview';
import { listSamples } from '../samples';
import { listStars } from '../stars';
import { asItStands, type CollectionFiles } from './collection-files';
import { populationsTable } from './population-rows';
import { runTables } from './run-tables';
import { targetsTable, writtenTarget } from './written-rows';

/** Stars read at once; a page of the list holds at most as many. */
const STARS_AT_ONCE = 500;

const distanceOf = (value: { distancePc: number | null; parallaxMas: number | null } | null) =>
  value === null
    ? null
    : (value.distancePc ?? (value.parallaxMas === null ? null : 1000 / value.parallaxMas));

function starRow(star: StarView, entry: StarEntry): Record<string, WrittenCell> {
  return {
    star: star.name,
    survey: entry.survey.slug,
    name: entry.name,
    gaia_dr3_id: entry.gaiaDr3Id ?? star.gaiaDr3Id,
    ra: entry.raDeg,
    dec: entry.decDeg,
    distance: distanceOf(entry.distance),
    age: entry.age?.ageMyr ?? null,
    mass: entry.hostMassMsun,
    spectral_type: entry.spectralType,
    moving_group: entry.movingGroup,
    adopted_distance: distanceOf(star.distance?.value ?? null),
    adopted_distance_source: star.distance?.source.words ?? null,
    adopted_age: star.age?.value.ageMyr ?? null,
    adopted_age_source: star.age?.source.words ?? null,
    epochs: entry.epochs,
    probability: entry.probability,
    left_out_reason: entry.leftOutReason,
  };
}

async function everyStar(actor: Actor): Promise<StarView[]> {
  const stars: StarView[] = [];
  for (;;) {
    const page = await listStars(actor, { limit: STARS_AT_ONCE, offset: stars.length });
    stars.push(...page.stars);
    if (page.stars.length === 0 || stars.length >= page.total) return stars;
  }
}

/** The list of stars: one row an entry, with the values that maps rest on. */
export function starFiles(actor: Actor): CollectionFiles {
  demand(actor, 'read');
  return {
    stem: 'stars',
    audited: { kind: 'collaboration', id: actor.collaborationId },
    tables: {
      stars: {
        what: 'Every star with each survey’s entry and the values that maps rest on',
        latex: { columns: ['star', 'survey', 'adopted_distance', 'adopted_age', 'probability'] },
        build: async () => {
          const stars = await everyStar(actor);
          return tableOfRows(
            { name: 'stars', title: 'Stars', provenance: asItStands('stars of all surveys') },
            starDefinitions,
            stars.flatMap((star) => star.entries.map((entry) => starRow(star, entry))),
            { dropEmpty: ['star', 'survey', 'name'] },
          );
        },
      },
    },
  };
}

/** Every version of every population. */
export function populationFiles(actor: Actor): CollectionFiles {
  demand(actor, 'read');
  const { collaborationId } = actor;
  return {
    stem: 'populations',
    audited: { kind: 'collaboration', id: collaborationId },
    tables: {
      populations: {
        what: 'Every version of every population with its laws and indices',
        latex: runTables.populations.latex,
        build: async () => {
          const rows = await PopulationRow.findAll({
            where: { collaborationId },
            order: [
              ['number', 'ASC'],
              ['version', 'ASC'],
            ],
          });
          return populationsTable(
            { title: 'Populations', provenance: asItStands('populations') },
            rows.map((row) => ({
              key: `P-${row.number}`,
              version: row.version,
              name: row.name,
              digest: row.digest,
              definition: row.definition,
            })),
          );
        },
      },
    },
  };
}

/** A version of a sample: every entry of its surveys, in or out, and why. */
export async function sampleFiles(actor: Actor, id: string): Promise<CollectionFiles> {
  const { samples } = await listSamples(actor);
  const sample = samples.find((one) => one.id === id);
  if (!sample) throw new NotFound('sample');
  const key = `${sample.key} version ${sample.version}`;
  return {
    stem: `${sample.key}-version-${sample.version}`,
    audited: { kind: 'sample', id },
    tables: {
      targets: {
        what: 'Entries of all surveys, with whether and why the sample takes them',
        latex: runTables.targets.latex,
        build: async () => {
          const definition = sampleDefinitionSchema.parse(sample.definition);
          const { surveys, targets } = await readEntries(actor);
          const slugOf = new Map(surveys.map((row) => [row.id, row.slug]));
          const open = targets.filter(({ leftOutReason }) => leftOutReason === null);
          const reasons = findLeftOut(open, definition);
          const rows = await TargetRow.findAll({ where: { id: targets.map((row) => row.id) } });
          const rowOf = new Map(rows.map((row) => [row.id, row]));
          return targetsTable(
            {
              name: 'targets',
              title: `Sample ${key}, ${sample.name}`,
              provenance: [
                ...asItStands(`sample ${key}, ${sample.name}`),
                ['selection', sample.words],
                ['sample_digest', sample.digest],
              ],
            },
            targets.map((target) => writtenTarget(rowOf.get(target.id) ?? target)),
            targets.map((target) => {
              const left = target.leftOutReason ?? unmetWords(reasons.get(target));
              return {
                survey: slugOf.get(target.surveyId) ?? null,
                used: left === null,
                reason: left,
              };
            }),
          );
        },
      },
    },
  };
}

const unmetWords = (left: { reason: string; unmet: string } | undefined) =>
  left === undefined
    ? null
    : left.reason === left.unmet
      ? left.reason
      : `${left.reason}: ${left.unmet}`;
