import type { Transaction } from 'sequelize';
import { needsHostMass, type Population } from '@/lib/population';
import { refuseWithdrawn } from '@/lib/queue/withdrawn-surveys';
import type { RatePriorInput } from '@/lib/schemas/analyses';
import type { RunInputs } from '@/lib/schemas/runs';
import type { SettingsOf, StudyKind, StudySettings } from '@/lib/schemas/study-settings';
import { CoolingTableRow, PopulationRow, type RunRow, SurveyRow } from '@/models';
import { checkSweep, refuse } from './sweep-checks';

interface Asked<Kind extends StudyKind> {
  run: RunRow;
  inputs: RunInputs;
  settings: SettingsOf<Kind>;
  population: Population;
  transaction: Transaction;
}
type Check<Kind extends StudyKind> = (asked: Asked<Kind>) => Promise<void> | void;

/** A rate that the run's quantity can have. */
function checkRate(run: RunRow, item: string, rate: number | undefined): void {
  if (rate === undefined || rate <= 1 || run.recipe.likelihood === 'mean-number') return;
  refuse(item, `Found ${rate}; expected at most 1 for a fraction of stars`, 'out-of-range');
}

async function checkPopulations(
  { collaborationId }: RunRow,
  ids: string[],
  item: (index: number) => string,
  transaction: Transaction,
): Promise<void> {
  const rows = await PopulationRow.findAll({
    attributes: ['id'],
    where: { collaborationId, id: ids },
    transaction,
  });
  const known = new Set(rows.map(({ id }) => id));
  const unknown = ids.findIndex((id) => !known.has(id));
  if (unknown >= 0) refuse(item(unknown), 'There is no such population', 'choice-unknown');
}

/** The built-in law, null, is everybody's. */
async function checkCoolingTable(
  { collaborationId }: RunRow,
  id: string | null,
  item: string,
  transaction: Transaction,
): Promise<void> {
  if (id === null) return;
  const where = { id, collaborationId };
  const table = await CoolingTableRow.findOne({ attributes: ['id'], where, transaction });
  if (!table) refuse(item, 'There is no such cooling table', 'choice-unknown');
}

function isProper(prior: RatePriorInput, likelihood: string): boolean {
  if (prior.law === 'jeffreys') return likelihood === 'host-fraction' || prior.max !== undefined;
  return prior.law !== 'gamma' || prior.rate > 0;
}

const checks: { [Kind in StudyKind]?: Check<Kind> } = {
  'free-indices': ({ run, population }) => {
    if (run.recipe.candidates || run.recipe.background) {
      refuse(
        'kind',
        'Free indices count confirmed companions alone: run the analysis without open candidates ' +
          'and without a background',
      );
    }
    if (population.form === 'power-law') return;
    refuse(
      'kind',
      'Free indices need a population that is a power law in mass and semi-major axis: ' +
        'run the analysis with one',
    );
  },

  'limit-map': ({ run, settings, population }) => {
    const { prior, likelihood } = run.recipe;
    if (!isProper(prior, likelihood)) {
      refuse(
        'kind',
        'Where nothing can be seen the limit is the prior’s own, and this prior has no end: give ' +
          'it a maximum',
      );
    }
    if (!settings.tailCumulative || population.form === 'power-law' || population.form === 'shaped')
      return;
    refuse('tailCumulative', 'Tails need ranges in mass and semi-major axis that all stars share');
  },

  sweep: ({ settings, population }) => checkSweep(settings, population),

  systematics: async ({ run, inputs, settings, transaction }) => {
    const { changes = [] } = settings;
    for (const [i, change] of changes.entries()) {
      if (change.change === 'combination' && !sharesStars(inputs)) {
        refuse(`changes.${i}`, 'No star of this run is in several surveys');
      }
      if (change.change !== 'cooling') continue;
      const item = `changes.${i}.coolingTableId`;
      await checkCoolingTable(run, change.coolingTableId, item, transaction);
    }
  },

  'ages-cooling': async ({ run, settings, transaction }) => {
    for (const [i, coolingTableId] of (settings.coolingTableIds ?? []).entries()) {
      await checkCoolingTable(run, coolingTableId, `coolingTableIds.${i}`, transaction);
    }
  },

  'overlap-rules': ({ inputs }) => {
    if (!sharesStars(inputs)) refuse('kind', 'No star of this run is in several surveys');
  },

  'population-comparison': ({ run, settings, transaction }) =>
    checkPopulations(run, settings.populationIds, (i) => `populationIds.${i}`, transaction),

  counts: ({ run, settings }) => checkRate(run, 'rate', settings.rate),

  forecast: async ({ run, inputs, settings, population, transaction }) => {
    checkRate(run, 'assumedRate', settings.assumedRate);
    checkRate(run, 'wantedLimit', settings.wantedLimit);
    const { planned } = settings;
    if (planned.kind === 'stars-like-these') {
      const own = new Set(inputs.surveys.map(({ id }) => id));
      const unknown = planned.surveyIds?.findIndex((id) => !own.has(id)) ?? -1;
      if (unknown >= 0) {
        refuse(`planned.surveyIds.${unknown}`, 'Not a survey of this run', 'choice-unknown');
      }
      return;
    }
    checkCurve(planned.curve);
    const massless = planned.targets.findIndex((target) => target.hostMassMsun === undefined);
    if (needsHostMass(population) && massless >= 0) {
      refuse(
        `planned.targets.${massless}.hostMassMsun`,
        'Expected a mass: the population of this run depends on it',
        'value-missing',
      );
    }
    const survey = await SurveyRow.findByPk(inputs.surveys[0].id, {
      attributes: ['id'],
      transaction,
    });
    if (!survey)
      refuse('planned', 'The survey whose map settings would hold is not there any more');
  },

  calibration: async ({ run, settings, transaction }) => {
    const { prior, likelihood } = run.recipe;
    if (!isProper(prior, likelihood)) {
      refuse(
        'kind',
        'Calibration draws rates from the prior, and this prior has no end: give it a maximum',
      );
    }
    for (const [i, rate] of (settings.truths ?? []).entries()) checkRate(run, `truths.${i}`, rate);
    if (settings.truthPopulationId === undefined) return;
    await checkPopulations(
      run,
      [settings.truthPopulationId],
      () => 'truthPopulationId',
      transaction,
    );
  },
};

const sharesStars = ({ stars }: RunInputs) => stars.some(({ surveys }) => surveys.length > 1);

function checkCurve(curve: { separationArcsec: number[]; contrastMag: number[] }): void {
  const { separationArcsec, contrastMag } = curve;
  if (separationArcsec.length !== contrastMag.length) {
    refuse(
      'planned.curve.contrastMag',
      `Found ${contrastMag.length} entries; expected one for each of ${separationArcsec.length} separations`,
      'too-few',
    );
  }
  const fall = separationArcsec.findIndex((x, i) => i > 0 && x <= separationArcsec[i - 1]);
  if (fall < 0) return;
  refuse(
    `planned.curve.separationArcsec.${fall}`,
    'Expected increasing separations',
    'range-order',
  );
}

/**
 * What can be refused before anything is queued.
 *
 * @throws InputError whose fault names the place in the settings
 */
export async function refuseUnanswerable(
  run: RunRow,
  settings: StudySettings,
  transaction: Transaction,
): Promise<void> {
  await refuseWithdrawn(run.collaborationId, run.recipe.surveyIds, transaction);
  const population = await PopulationRow.findOne({
    where: { id: run.recipe.populationId, collaborationId: run.collaborationId },
    transaction,
    rejectOnEmpty: true,
  });
  const check = checks[settings.kind] as Check<StudyKind> | undefined;
  await check?.({
    run,
    inputs: run.inputs as RunInputs,
    settings,
    population: population.definition,
    transaction,
  });
}
