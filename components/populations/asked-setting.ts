import { priorFromText } from '@/components/runs/live-address';
import type { Query } from '@/components/runs/live-setting';
import {
  axisConventionSchema,
  indexConventionSchema,
  type ListedPopulation,
} from '@/lib/schemas/populations';
import {
  type BuilderSetting,
  defaultSetting,
  FIRST_DEFINITION,
  FIRST_PREVIEW,
  type PreviewSetting,
} from './builder-setting';
import { lawFromQuery } from './law-of-address';

/** What an address asks of a population's page, in the form that the version has. */
export interface AskedSetting {
  /** Of laws; null for a table of systems. */
  laws: BuilderSetting | null;
  preview: PreviewSetting;
}

/** Read by the server, so that the schemas stay out of what the page loads. */
export function askedSetting(
  query: Query,
  version: Pick<ListedPopulation, 'definition'> | undefined,
): AskedSetting {
  const definition = version?.definition ?? FIRST_DEFINITION;
  return {
    laws:
      definition.form === 'systems' ? null : builderFromQuery(query, defaultSetting(definition)),
    preview: previewFromQuery(query, FIRST_PREVIEW),
  };
}

function previewFromQuery<S extends PreviewSetting>(query: Query, saved: S): S {
  const stated = Number(query.f);
  return {
    ...saved,
    prior: priorFromText(query.prior) ?? saved.prior,
    statedFraction: stated > 0 && stated <= 1 ? stated : saved.statedFraction,
  };
}

export function builderFromQuery(query: Query, saved: BuilderSetting): BuilderSetting {
  const mass = indexConventionSchema.safeParse(query.convention);
  const axis = axisConventionSchema.safeParse(query.axisConvention ?? query.convention);
  return {
    ...previewFromQuery(query, saved),
    definition: lawFromQuery(query, saved.definition),
    conventions: {
      mass: mass.success ? mass.data : saved.conventions.mass,
      semiMajorAxis: axis.success ? axis.data : saved.conventions.semiMajorAxis,
    },
  };
}
