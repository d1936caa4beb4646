'use client';

import { ConsequenceSwitch, type SwitchOption } from '@/components/ui/consequence-switch';
import { type CandidateChoice, rateDependent } from './consequences';
import type { LiveSetting } from './live-setting';

interface CandidateSwitchProps {
  setting: LiveSetting;
  saved: LiveSetting;
  /** The limit that a choice would give, in words. */
  consequence(choice: CandidateChoice): string | undefined;
  onSetting(setting: LiveSetting): void;
}

/** What is done with candidates without an answer; a rate of theirs comes from the recipe. */
export function CandidateSwitch(props: CandidateSwitchProps) {
  const { setting, saved, consequence, onSetting } = props;
  const followed = rateDependent(setting, saved);
  const options: SwitchOption<CandidateChoice>[] = [
    { value: 'none', label: 'set aside', consequence: consequence('none') },
    { value: 'fixed', label: 'by chance', consequence: consequence('fixed') },
  ];
  if (followed) {
    const value = 'rate-dependent';
    options.push({ value, label: 'with the rate', consequence: consequence(value) });
  }
  const refused =
    setting.detections === 'none'
      ? 'All detections are set aside, candidates with them.'
      : undefined;
  return (
    <ConsequenceSwitch
      label="Unvetted candidates"
      value={refused === undefined ? (setting.candidates?.treatment ?? 'none') : 'none'}
      onChange={(choice) => {
        const { candidates: _before, ...rest } = setting;
        if (choice === 'none') onSetting(rest);
        else
          onSetting({ ...rest, candidates: choice === 'fixed' ? { treatment: choice } : followed });
      }}
      options={options.map((option) => ({
        ...option,
        disabledReason: option.value === 'none' ? undefined : refused,
      }))}
    />
  );
}
