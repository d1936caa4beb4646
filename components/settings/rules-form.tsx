'use client';

import { useState } from 'react';
import { useAction } from '@/components/hooks/use-action';
import { Button } from '@/components/ui/button';
import { NumberField } from '@/components/ui/number-field';
import { SelectField } from '@/components/ui/select-field';
import type { CombinationRule } from '@/lib/schemas/combinations';
import type { ChangeSettings } from '@/lib/schemas/settings';
import type { SettingsPartProps } from './place-form';
import { ruleLabels } from './settings-parts';

type Two = 'by-itself' | 'on' | 'off';
const twoOf = (chosen: boolean | null): Two =>
  chosen === null ? 'by-itself' : chosen ? 'on' : 'off';

/** Lead analysis, rule for shared stars, level, and who must agree to a release. */
export function RulesForm({
  settings,
  save,
  analyses,
}: SettingsPartProps & { analyses: { key: string; name: string }[] }) {
  const [lead, setLead] = useState(settings.leadAnalysis ?? '');
  const [rule, setRule] = useState(settings.combination);
  const [level, setLevel] = useState(String(Number((100 * settings.credibleLevel).toFixed(6))));
  const [two, setTwo] = useState(twoOf(settings.needsTwoPeopleChosen));
  const { perform, isBusy } = useAction();
  const isLocked = !settings.can.manage;
  const percent = Number(level);
  const isLevel = percent > 0 && percent < 100;
  const change: ChangeSettings = {
    leadAnalysis: lead === '' ? null : lead,
    combination: rule,
    credibleLevel: Number((percent / 100).toFixed(8)),
    needsTwoPeople: two === 'by-itself' ? null : two === 'on',
  };
  const by = settings.needsTwoPeople ? 'on now' : 'off now';
  return (
    <form
      className="flex max-w-[520px] flex-col gap-4"
      onSubmit={(event) => {
        event.preventDefault();
        if (isLevel) void perform(() => save(change, 'The rules are saved.'));
      }}
    >
      <SelectField
        label="Lead analysis"
        hint="The one that the overview shows first"
        value={lead}
        disabled={isLocked}
        onChange={({ target }) => setLead(target.value)}
        options={[
          { value: '', label: 'the one with the newest run' },
          ...analyses.map(({ key, name }) => ({ value: key, label: `${key} ${name}` })),
        ]}
      />
      <SelectField
        label="A star in several surveys"
        hint="New analyses and combinations begin with this rule; those that exist keep theirs"
        value={rule}
        disabled={isLocked}
        onChange={({ target }) => setRule(target.value as CombinationRule)}
        options={Object.entries(ruleLabels).map(([value, label]) => ({ value, label }))}
      />
      <NumberField
        label="Credible level"
        unit="%"
        hint="New analyses begin with it"
        error={isLevel ? undefined : 'more than 0 and less than 100'}
        value={level}
        step="any"
        required
        disabled={isLocked}
        onChange={({ target }) => setLevel(target.value)}
      />
      <SelectField
        label="A second person agrees to each release"
        hint="Somebody else than who froze the run"
        value={two}
        disabled={isLocked}
        onChange={({ target }) => setTwo(target.value as Two)}
        options={[
          { value: 'by-itself', label: `as soon as two people could (${by})` },
          { value: 'on', label: 'always' },
          { value: 'off', label: 'never' },
        ]}
      />
      {!isLocked && (
        <div>
          <Button type="submit" isBusy={isBusy}>
            Save the rules
          </Button>
        </div>
      )}
    </form>
  );
}
