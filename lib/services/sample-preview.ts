import type { z } from 'zod';
import type { Actor } from '@/lib/access/actor';
import { demand } from '@/lib/access/permissions';
import { describeSample } from '@/lib/schemas/sample-words';
import {
  type previewSampleSchema,
  type SampleDefinition,
  type SampleHistogram,
  type SamplePreview,
  spectralClasses,
} from '@/lib/schemas/samples';
import { SurveyRow, TargetRow } from '@/models';
import { applyAdopted, loadAdopted } from '@/models/adopted-values';
import { canonicalJson } from '@/models/digest';
import { findLeftOut, gatherStarFacts, type StarFacts } from '@/models/sample-selection';
import { checkSurveys, surveyNames } from './samples';
import { notArchived } from './sharing/archived';
import { together } from './together';

const BINS = 14;

const COLUMNS = [
  'id',
  'starId',
  'surveyId',
  'name',
  'ageMyr',
  'ageMinMyr',
  'ageMaxMyr',
  'distancePc',
  'parallaxMas',
  'hostMassMsun',
  'spectralType',
  'movingGroup',
  'attributes',
  'leftOutReason',
];

/** Entries of surveys in the order in which their facts hold. */
export async function readEntries(actor: Actor, surveyIds?: readonly string[]) {
  const surveys = await SurveyRow.findAll({
    where: {
      collaborationId: actor.collaborationId,
      ...(surveyIds ? { id: [...surveyIds] } : notArchived()),
    },
    order: [
      ['position', 'ASC'],
      ['id', 'ASC'],
    ],
  });
  const ids = surveys.map(({ id }) => id);
  const targets = await TargetRow.findAll({ attributes: COLUMNS, where: { surveyId: ids } });
  const adopted = await loadAdopted(actor.collaborationId);
  for (const target of targets) applyAdopted(target, adopted);
  const place = new Map(ids.map((id, i) => [id, i]));
  const placeOf = (target: TargetRow) => place.get(target.surveyId) as number;
  return { surveys, targets: targets.sort((a, b) => placeOf(a) - placeOf(b)) };
}

type Selected = { facts: StarFacts; isSelected: boolean };

/** Bins equally wide in the logarithm over all stars; null where no star has the fact. */
function countBins(
  stars: Selected[],
  factOf: (facts: StarFacts) => number | null,
): SampleHistogram | null {
  const known = stars.flatMap(({ facts, isSelected }) => {
    const value = factOf(facts);
    return value === null ? [] : [{ value, isSelected }];
  });
  if (known.length === 0) return null;
  let low = Math.min(...known.map(({ value }) => value));
  let high = Math.max(...known.map(({ value }) => value));
  if (low === high) [low, high] = [low / 1.5, high * 1.5];
  const step = Math.log(high / low) / BINS;
  const edges = Array.from({ length: BINS + 1 }, (_, i) => low * Math.exp(i * step));
  const all = new Array<number>(BINS).fill(0);
  const selected = new Array<number>(BINS).fill(0);
  for (const { value, isSelected } of known) {
    const bin = Math.min(BINS - 1, Math.floor(Math.log(value / low) / step));
    all[bin]++;
    if (isSelected) selected[bin]++;
  }
  const lacking = stars.filter(({ facts }) => factOf(facts) === null);
  const unknown = {
    all: lacking.length,
    selected: lacking.filter(({ isSelected }) => isSelected).length,
  };
  return { edges, all, selected, unknown };
}

function countTypes(stars: Selected[]): SamplePreview['spectralTypes'] {
  const count = (letter: StarFacts['spectralClass']) => {
    const ofType = stars.filter(({ facts }) => facts.spectralClass === letter);
    return { all: ofType.length, selected: ofType.filter((star) => star.isSelected).length };
  };
  return [
    ...spectralClasses.map((type) => ({ type, ...count(type) })),
    { type: 'not known', ...count(null) },
  ].filter(({ all }) => all > 0);
}

function countReasons(reasons: string[]): SamplePreview['leftOut'] {
  const counts = new Map<string, number>();
  for (const reason of reasons) counts.set(reason, (counts.get(reason) ?? 0) + 1);
  return [...counts]
    .map(([reason, entries]) => ({ reason, entries }))
    .sort((a, b) => b.entries - a.entries);
}

function listGroups(stars: Selected[]): SamplePreview['movingGroups'] {
  const counts = new Map<string, number>();
  for (const { facts } of stars) {
    const group = facts.movingGroup;
    if (group !== null) counts.set(group, (counts.get(group) ?? 0) + 1);
  }
  return [...counts]
    .map(([name, count]) => ({ name, stars: count }))
    .sort((a, b) => a.name.localeCompare(b.name));
}

/** What a selection would hold now, before it is saved. */
export async function previewSample(
  actor: Actor,
  { definition, surveyIds }: z.output<typeof previewSampleSchema>,
): Promise<SamplePreview> {
  demand(actor, 'read');
  await checkSurveys(actor, definition.surveyIds ?? [], 'definition.surveyIds');
  await checkSurveys(actor, surveyIds ?? [], 'surveyIds');
  const asked = canonicalJson({ definition, surveyIds: surveyIds ?? null });
  return together(`sample ${actor.collaborationId} ${asked}`, () =>
    readSample(actor, definition, surveyIds),
  );
}

async function readSample(
  actor: Actor,
  definition: SampleDefinition,
  surveyIds: readonly string[] | undefined,
): Promise<SamplePreview> {
  const { targets } = await readEntries(actor, surveyIds);
  const usable = targets.filter(({ leftOutReason }) => leftOutReason === null);
  const out = findLeftOut(usable, definition);
  const selected = usable.filter((entry) => !out.has(entry));
  const selectedIds = new Set(selected.map(({ starId }) => starId));
  const stars = [...gatherStarFacts(targets)].map(([starId, facts]) => ({
    facts,
    isSelected: selectedIds.has(starId),
  }));
  const setAside = targets.length - usable.length;
  return {
    words: describeSample(definition, await surveyNames(actor)),
    stars: { all: stars.length, selected: selectedIds.size },
    entries: { all: targets.length, selected: selected.length },
    leftOut: [
      ...countReasons([...out.values()].map(({ unmet }) => unmet)),
      ...(setAside > 0 ? [{ reason: 'left out of its survey', entries: setAside }] : []),
    ],
    ageMyr: countBins(stars, ({ ageMyr }) => ageMyr),
    distancePc: countBins(stars, ({ distancePc }) => distancePc),
    spectralTypes: countTypes(stars),
    movingGroups: listGroups(stars),
  };
}
