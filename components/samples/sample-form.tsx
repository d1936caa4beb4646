'use client';

import { SurveyCheckbox } from '@/components/surveys/survey-checkbox';
import { CheckboxField } from '@/components/ui/checkbox-field';
import { NumberField } from '@/components/ui/number-field';
import { SelectField } from '@/components/ui/select-field';
import type { SamplePreview } from '@/lib/schemas/samples';
import { spectralClasses } from '@/lib/schemas/spectral-classes';
import type { SurveyView } from '@/lib/schemas/surveys';
import type { RangeName, SampleDraft } from './sample-draft';

interface SampleFormProps {
  draft: SampleDraft;
  faults?: Partial<Record<string, string>>;
  surveys: SurveyView[];
  groups: SamplePreview['movingGroups'];
  onChange(draft: SampleDraft): void;
}

const types = [
  { value: '', label: 'any' },
  ...spectralClasses.map((value) => ({ value, label: value })),
];

function toggled(list: string[], item: string, isIn: boolean): string[] {
  return isIn ? [...list, item] : list.filter((one) => one !== item);
}

/** The parts of a selection; a part that is left empty asks nothing. */
export function SampleForm({ draft, faults, surveys, groups, onChange }: SampleFormProps) {
  const change = (part: Partial<SampleDraft>) => onChange({ ...draft, ...part });
  const offered = [...groups.map(({ name }) => name), ...draft.movingGroups].filter(
    (name, i, all) => all.indexOf(name) === i,
  );
  return (
    <div className="grid gap-5">
      <fieldset>
        <legend className="mb-1 text-ink2 text-note">Listed by at least one of (none: any)</legend>
        <div className="grid gap-x-4 sm:grid-cols-2">
          {surveys.map((survey) => (
            <SurveyCheckbox
              key={survey.id}
              survey={survey}
              chosen={draft.surveyIds}
              onChange={(surveyIds) => change({ surveyIds })}
            />
          ))}
        </div>
      </fieldset>
      <div className="grid grid-cols-2 gap-3">
        <SelectField
          label="Spectral type from"
          options={types}
          value={draft.typeFrom}
          onChange={(event) => change({ typeFrom: event.target.value })}
        />
        <SelectField
          label="to"
          options={types}
          value={draft.typeTo}
          error={faults?.['spectralType.to']}
          onChange={(event) => change({ typeTo: event.target.value })}
        />
      </div>
      <RangeFields name="ageMyr" label="Age" unit="Myr" {...{ draft, faults, onChange }} />
      <RangeFields name="distancePc" label="Distance" unit="pc" {...{ draft, faults, onChange }} />
      <RangeFields
        name="hostMassMsun"
        label="Mass of the star"
        unit="solar masses"
        {...{ draft, faults, onChange }}
      />
      {offered.length > 0 && (
        <fieldset>
          <legend className="mb-1 text-ink2 text-note">In one of these groups (none: any)</legend>
          <div className="grid max-h-56 gap-x-4 overflow-y-auto sm:grid-cols-2">
            {offered.map((name) => (
              <CheckboxField
                key={name}
                checked={draft.movingGroups.includes(name)}
                onChange={(event) =>
                  change({ movingGroups: toggled(draft.movingGroups, name, event.target.checked) })
                }
                label={name}
              />
            ))}
          </div>
        </fieldset>
      )}
      <SelectField
        label="Listed as"
        value={draft.multiplicity}
        onChange={(event) =>
          change({ multiplicity: event.target.value as SampleDraft['multiplicity'] })
        }
        options={[
          { value: '', label: 'single, binary or not stated' },
          { value: 'single', label: 'single' },
          { value: 'multiple', label: 'binary or multiple' },
        ]}
      />
      <div>
        <CheckboxField
          checked={draft.knownCompanion === 'left-out'}
          onChange={(event) =>
            change({ knownCompanion: event.target.checked ? 'left-out' : 'kept' })
          }
          label="Leave out stars chosen because a companion was known"
          hint="They were not drawn blindly: kept, they raise the rate. Where another survey lists the star for other reasons, that entry stays."
        />
        <CheckboxField
          checked={draft.unknown === 'kept'}
          onChange={(event) => change({ unknown: event.target.checked ? 'kept' : 'left-out' })}
          label="Keep stars of which an asked fact is not known"
        />
      </div>
    </div>
  );
}

interface RangeFieldsProps extends Pick<SampleFormProps, 'draft' | 'faults' | 'onChange'> {
  name: RangeName;
  label: string;
  unit: string;
}

function RangeFields({ name, label, unit, draft, faults, onChange }: RangeFieldsProps) {
  const ends = draft.ranges[name];
  const set = (part: Partial<typeof ends>) =>
    onChange({ ...draft, ranges: { ...draft.ranges, [name]: { ...ends, ...part } } });
  return (
    <div className="grid grid-cols-2 gap-3">
      <NumberField
        label={`${label}, at least`}
        unit={unit}
        value={ends.min}
        error={faults?.[`${name}.min`]}
        onChange={(event) => set({ min: event.target.value })}
      />
      <NumberField
        label="at most"
        aria-label={`${label}, at most`}
        unit={unit}
        value={ends.max}
        error={faults?.[`${name}.max`]}
        onChange={(event) => set({ max: event.target.value })}
      />
    </div>
  );
}
