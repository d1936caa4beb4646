import { SelectField } from '@/components/ui/select-field';
import type { MapSettings } from '@/lib/schemas/sensitivity';
import type { CoolingTableView } from '@/lib/schemas/surveys';
import { MapRuleFields, readMapRules } from './map-rule-fields';
import { describeEccentricity, eccentricityChoices } from './map-setting-words';

interface MapSettingsFieldsProps {
  tables: CoolingTableView[];
  /** Settings to begin with; the first cooling table and the usual laws otherwise. */
  settings?: MapSettings;
  /** A cooling table that is proposed in place of the present one. */
  proposedTableId?: string;
}

const BUILT_IN = 'built-in';

function coolingOf({ tables, settings, proposedTableId }: MapSettingsFieldsProps): string {
  if (proposedTableId !== undefined) return proposedTableId;
  if (settings === undefined) return tables[0]?.id ?? BUILT_IN;
  const { cooling } = settings;
  return cooling.kind === 'table' ? cooling.coolingTableId : BUILT_IN;
}

/** A law that only a script can set stays as it is and has a line of its own. */
function lawsFor(settings: MapSettings | undefined) {
  const law = settings?.eccentricity;
  const isOffered = (one: typeof law) => JSON.stringify(one) === JSON.stringify(law);
  if (law === undefined || eccentricityChoices.some((choice) => isOffered(choice.law)))
    return eccentricityChoices;
  return [...eccentricityChoices, { law, words: describeEccentricity(law) }];
}

/** Which relation, orbits and threshold turn contrast curves into completeness maps. */
export function MapSettingsFields(props: MapSettingsFieldsProps) {
  const { tables, settings } = props;
  const law = JSON.stringify(settings?.eccentricity ?? eccentricityChoices[0].law);
  return (
    <>
      <SelectField
        label="Cooling relation, age and mass to magnitude"
        name="cooling"
        key={tables.length}
        defaultValue={coolingOf(props)}
        options={[
          ...tables.map((table) => ({
            value: table.id,
            label: `${table.name} (${table.bands.join(', ')})`,
          })),
          { value: BUILT_IN, label: 'Approximate cooling law, built in' },
        ]}
      />
      <SelectField
        label="Eccentricities"
        name="eccentricity"
        defaultValue={law}
        options={lawsFor(settings).map((choice) => ({
          value: JSON.stringify(choice.law),
          label: choice.words,
        }))}
      />
      <SelectField
        label="Detection at the threshold"
        name="threshold"
        defaultValue={settings?.threshold ?? 'smooth'}
        options={[
          { value: 'smooth', label: 'smooth, half at the contrast limit' },
          { value: 'hard', label: 'hard, all or nothing at the contrast limit' },
        ]}
      />
      <MapRuleFields settings={settings} />
    </>
  );
}

/** The settings as the form holds them; axes and what lies outside tables are not on it. */
export function readMapSettings(
  form: FormData,
): Omit<
  MapSettings,
  'massOutsideTable' | 'ageOutsideTable' | 'ageNodesPerSide' | 'massMjup' | 'semiMajorAxisAu'
> {
  const cooling = String(form.get('cooling'));
  return {
    cooling: cooling === BUILT_IN ? { kind: BUILT_IN } : { kind: 'table', coolingTableId: cooling },
    eccentricity: JSON.parse(String(form.get('eccentricity'))),
    threshold: form.get('threshold') === 'hard' ? 'hard' : 'smooth',
    ...readMapRules(form),
  };
}
