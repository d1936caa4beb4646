import type { AnalysisRecipe } from '@/lib/schemas/analyses';
import type { SystematicChange } from '@/lib/schemas/study-settings';
import { hasBuiltInBand } from '@/lib/sensitivity';
import type { CoolingTableRow } from '@/models';
import { digestOf } from '@/models/digest';
import type { Sample } from './run-sample';

type Law = Extract<SystematicChange, { change: 'eccentricity' }>['law'];

/** Laws that a run is compared under: nothing eccentric, and everything up to 0.95. */
const LAWS: readonly Law[] = [{ law: 'circular' }, { law: 'uniform', max: 0.95 }];
const RULES = ['same-position', 'deepest', 'independent'] as const;
/** Tables beyond these are asked for by name. */
const MOST_TABLES = 12;

/** Every change that the surveys of a run allow; one that would change nothing is left out. */
export function defaultChanges(
  sample: Sample,
  tables: CoolingTableRow[],
  { combination }: AnalysisRecipe,
): SystematicChange[] {
  const settings = sample.surveys.map(({ row }) => row.mapSettings);
  const entries = sample.stars.flatMap((star) => star.entries);
  const computed = entries.filter(({ map }) => map.origin === 'computed');
  const changes: SystematicChange[] = [];
  if (computed.length > 0) {
    changes.push(
      { change: 'ages-young' },
      { change: 'ages-old' },
      { change: 'distances-near' },
      { change: 'distances-far' },
      ...otherCoolingModels(sample, tables.slice(0, MOST_TABLES)).map(
        (coolingTableId) => ({ change: 'cooling', coolingTableId }) as const,
      ),
      { change: 'threshold' },
      { change: 'n-sigma-up' },
      { change: 'n-sigma-down' },
    );
    for (const law of LAWS) {
      const isUsed = settings.every(({ eccentricity }) => digestOf(eccentricity) === digestOf(law));
      if (!isUsed) changes.push({ change: 'eccentricity', law });
    }
  }
  if (sample.stars.some((star) => star.entries.length > 1)) {
    for (const rule of RULES) {
      if (rule !== combination) changes.push({ change: 'combination', rule });
    }
  }
  return changes;
}

/**
 * Cooling models that know every band of the sample's curves and that not all of its surveys use
 * already: the built-in law, null, then tables in their order.
 */
export function otherCoolingModels(
  { surveys, stars }: Sample,
  tables: CoolingTableRow[],
): (string | null)[] {
  const bands = new Set(
    stars
      .flatMap(({ entries }) => entries)
      .filter(({ map }) => map.origin === 'computed')
      .flatMap(({ curves }) => curves.map(({ band }) => band)),
  );
  const isUsed = (id: string | null) =>
    surveys.every(({ row: { mapSettings } }) =>
      mapSettings.cooling.kind === 'table'
        ? mapSettings.cooling.coolingTableId === id
        : id === null,
    );
  const fitting = tables.filter(({ magnitudes }) => [...bands].every((band) => band in magnitudes));
  const models = [
    ...([...bands].every(hasBuiltInBand) ? [null] : []),
    ...fitting.map(({ id }) => id),
  ];
  return models.filter((id) => !isUsed(id));
}
