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
      ...coolingChanges(settings, computed, tables),
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

function coolingChanges(
  settings: Sample['surveys'][number]['row']['mapSettings'][],
  computed: Sample['stars'][number]['entries'],
  tables: CoolingTableRow[],
): SystematicChange[] {
  const bands = [...new Set(computed.flatMap(({ curves }) => curves.map(({ band }) => band)))];
  const isUsed = (id: string | null) =>
    settings.every(({ cooling }) =>
      cooling.kind === 'table' ? cooling.coolingTableId === id : id === null,
    );
  const changes: SystematicChange[] = [];
  if (!isUsed(null) && bands.every(hasBuiltInBand)) {
    changes.push({ change: 'cooling', coolingTableId: null });
  }
  for (const { id, magnitudes } of tables.slice(0, MOST_TABLES)) {
    if (isUsed(id) || !bands.every((band) => band in magnitudes)) continue;
    changes.push({ change: 'cooling', coolingTableId: id });
  }
  return changes;
}
