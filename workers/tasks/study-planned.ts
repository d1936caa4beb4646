import { InputError } from '@/lib/errors';
import type { PlannedSurvey } from '@/lib/schemas/study-settings';
import { ENGINE_VERSION, type StarInputs } from '@/lib/sensitivity';
import { SurveyRow } from '@/models';
import { digestOf } from '@/models/digest';
import { loadRecipe } from '@/models/map-recipe';
import { readMaps } from './stored-maps';
import type { StudyWork } from './study-context';
import { ensureMaps, type NewMap } from './study-maps';
import { loadRunSample } from './study-sample';
import { makeVariations, planVariation } from './study-variation';

/** The stars of a planned survey, or those that its stars are to be like. */
export interface PlannedStars {
  names: string[];
  /** Shape [name, mass, semiMajorAxis] on the run's grid, round(65535 C). */
  maps: Uint16Array;
  /** Shape [name] [M_Sun], NaN where unknown. */
  hostMassMsun: Float64Array;
  notes: string[];
}

type LikeThese = Extract<PlannedSurvey, { kind: 'stars-like-these' }>;
type Targets = Extract<PlannedSurvey, { kind: 'targets' }>;

export function collectPlanned(given: StudyWork, planned: PlannedSurvey): Promise<PlannedStars> {
  return planned.kind === 'targets'
    ? collectTargets(given, planned)
    : collectLikeThese(given, planned);
}

async function collectLikeThese(given: StudyWork, planned: LikeThese): Promise<PlannedStars> {
  const { run, collaborationId, grid, question } = given;
  const { stars } = run.inputs;
  const { surveyIds, deeperByMag } = planned;
  const chosen = [...stars.keys()].filter(
    (star) => !surveyIds || stars[star].surveys.some((id) => surveyIds.includes(id)),
  );
  if (chosen.length === 0) {
    throw new InputError({
      code: 'empty-selection',
      message: 'No star of the run is in the surveys that were chosen',
    });
  }
  const { digests, notes } =
    deeperByMag === 0
      ? { digests: stars.map(({ mapDigest }) => mapDigest), notes: [] }
      : await deepen(given, deeperByMag);
  const maps = await readMaps(
    collaborationId,
    chosen.map((star) => digests[star]),
    grid,
  );
  return {
    names: chosen.map((star) => stars[star].name),
    maps,
    hostMassMsun: Float64Array.from(chosen, (star) => question.hostMassMsun[star]),
    notes,
  };
}

/** The maps of the run's stars with every curve deeper by so many magnitudes. */
async function deepen(given: StudyWork, byMag: number) {
  const sample = await loadRunSample(given);
  const deeper = (star: StarInputs): StarInputs => ({
    ...star,
    curves: star.curves.map((curve) => ({
      ...curve,
      contrastMag: curve.contrastMag.map((limit) => Math.max(0, limit + byMag)),
    })),
  });
  const name = `curves deeper by ${byMag} mag`;
  const planned = await planVariation(given, sample, { name, star: deeper });
  const [made] = await makeVariations(given, [planned]);
  if (made.fault !== null) throw new InputError({ code: 'no-map', message: made.fault });
  const { starsUnchanged, digests } = made;
  const notes =
    starsUnchanged === 0
      ? []
      : [`${starsUnchanged} stars keep their uploaded map: it has no curve to make deeper`];
  return { digests, notes };
}

function starOf(target: Targets['targets'][number], curve: Targets['curve']): StarInputs {
  const { ageMyr, ageLowerMyr, ageUpperMyr, hostMassMsun } = target;
  return {
    name: target.name,
    hostMag: target.hostMag,
    hostMags: [target.hostMag],
    ...(hostMassMsun !== undefined && { hostMassMsun }),
    age: {
      medianMyr: ageMyr,
      ...(ageLowerMyr !== undefined && { lowerMyr: ageLowerMyr }),
      ...(ageUpperMyr !== undefined && { upperMyr: ageUpperMyr }),
    },
    distance: { distancePc: target.distancePc, errorPc: target.distanceErrorPc },
    curves: [
      {
        band: curve.band,
        nSigma: curve.nSigma,
        separationArcsec: Float64Array.from(curve.separationArcsec),
        contrastMag: Float64Array.from(curve.contrastMag),
      },
    ],
  };
}

/** Maps of the planned targets by the settings of the run's first survey; equal ones are one map. */
async function collectTargets(given: StudyWork, planned: Targets): Promise<PlannedStars> {
  const { collaborationId, run, grid, further } = given;
  const [first] = run.inputs.surveys;
  const survey = await SurveyRow.findOne({ where: { id: first.id, collaborationId } });
  if (!survey) {
    throw new InputError({
      code: 'no-survey',
      message: `The survey ${first.name}, whose map settings would hold, is not there any more`,
    });
  }
  const recipe = { ...(await loadRecipe(collaborationId, survey.mapSettings)), grid };
  const wanted = planned.targets.map((target): NewMap => {
    const star = starOf(target, planned.curve);
    const { name, ...facts } = star;
    const inputs = {
      kind: 'planned',
      engineVersion: ENGINE_VERSION,
      star: facts,
      cooling: recipe.coolingDigest,
      settings: recipe.settings,
      grid,
    };
    return { digest: digestOf(inputs), inputs: { ...inputs }, star, recipe, grid };
  });
  const faults = await ensureMaps(given, wanted, 'maps');
  if (faults.size > 0) {
    throw new InputError({ code: 'no-map', message: [...faults.values()].sort()[0] });
  }
  const digests = wanted.map(({ digest }) => digest);
  further.push({ what: 'maps of the planned targets', digest: digestOf(digests) });
  return {
    names: planned.targets.map(({ name }) => name),
    maps: await readMaps(collaborationId, digests, grid),
    hostMassMsun: Float64Array.from(planned.targets, (one) => one.hostMassMsun ?? Number.NaN),
    notes: [`Maps by the settings of ${first.name}: ${recipe.coolingName}`],
  };
}
