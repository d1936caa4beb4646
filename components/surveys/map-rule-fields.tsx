import { NumberField } from '@/components/ui/number-field';
import { SelectField } from '@/components/ui/select-field';
import type { MapSettings } from '@/lib/schemas/sensitivity';

type Rules = Pick<
  MapSettings,
  'smallSample' | 'unstableZone' | 'candidates' | 'candidateHalfWidthArcsec' | 'fieldAge'
>;

/** What beside the curve itself decides how much of the sky around a star counts as searched. */
export function MapRuleFields({ settings }: { settings?: Rules }) {
  return (
    <>
      <NumberField
        label="Resolution element, for thresholds near the star"
        name="smallSampleFwhm"
        unit="arcsec"
        min={0}
        max={10}
        defaultValue={settings?.smallSample?.fwhmArcsec}
        hint="Raises the thresholds where few resolution elements tell the noise (Mawet et al. 2014). Empty: curves as given, right where they are corrected already."
      />
      <SelectField
        label="Candidates without an answer"
        name="candidates"
        defaultValue={settings?.candidates ?? 'ignore'}
        options={[
          { value: 'ignore', label: 'leave the curves; the analysis decides' },
          { value: 'cut', label: 'cut the curves where they lie' },
        ]}
        hint="Cut: companions as bright as the candidate or fainter do not count as searched for at its separation."
      />
      <NumberField
        label="Half-width of a cut"
        name="candidateHalfWidth"
        unit="arcsec"
        min={0}
        max={10}
        required
        defaultValue={settings?.candidateHalfWidthArcsec ?? 0.1}
        hint="On both sides of the candidate; used only where curves are cut."
      />
      <NumberField
        label="Field age, youngest"
        name="fieldAgeMin"
        unit="Myr"
        min={0}
        max={13_800}
        defaultValue={settings?.fieldAge?.minMyr}
        hint="For the share of a star that its membership probability leaves outside its group."
      />
      <NumberField
        label="Field age, oldest"
        name="fieldAgeMax"
        unit="Myr"
        min={0}
        max={13_800}
        defaultValue={settings?.fieldAge?.maxMyr}
        hint="Uniform in log age between the two. Both empty: every star belongs to its group."
      />
      <SelectField
        label="Orbits beside a stellar companion"
        name="unstableZone"
        defaultValue={settings?.unstableZone ?? 'ignore'}
        options={[
          { value: 'ignore', label: 'kept' },
          { value: 'remove', label: 'unstable ones taken out' },
        ]}
        hint="Where the targets list the companion’s orbit: on the axes that it makes unstable (Holman & Wiegert 1999) the map is 0."
      />
    </>
  );
}

const isEmpty = (form: FormData, name: string) => String(form.get(name) ?? '').trim() === '';
const numberIn = (form: FormData, name: string) => Number(form.get(name));

/** The rules as the form holds them; a field age with one end is sent as it is, and refused. */
export function readMapRules(form: FormData): Rules {
  const hasNoFieldAge = isEmpty(form, 'fieldAgeMin') && isEmpty(form, 'fieldAgeMax');
  return {
    smallSample: isEmpty(form, 'smallSampleFwhm')
      ? null
      : { fwhmArcsec: numberIn(form, 'smallSampleFwhm') },
    unstableZone: form.get('unstableZone') === 'remove' ? 'remove' : 'ignore',
    candidates: form.get('candidates') === 'cut' ? 'cut' : 'ignore',
    candidateHalfWidthArcsec: numberIn(form, 'candidateHalfWidth'),
    fieldAge: hasNoFieldAge
      ? null
      : { minMyr: numberIn(form, 'fieldAgeMin'), maxMyr: numberIn(form, 'fieldAgeMax') },
  };
}
