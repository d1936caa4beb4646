import type {
  ListedDefinition,
  PopulationDefinition,
  PowerLawDefinition,
} from './population-definitions';

/** Whether a definition is a power law whose rate is the same for all stars. */
export function isPlainPowerLaw(
  definition: PopulationDefinition | ListedDefinition,
): definition is PowerLawDefinition {
  return definition.form === 'power-law' && definition.hostScaling === undefined;
}
