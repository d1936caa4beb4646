'use client';

import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { ChangedMeanwhile } from '@/components/hooks/change';
import { markTarget } from '@/components/hooks/use-surveys';
import { CheckboxField } from '@/components/ui/checkbox-field';
import type { TargetView } from '@/lib/schemas/surveys';

interface ChosenForCompanionProps {
  collaboration: string;
  target: TargetView;
  onChanged(): void;
}

/** Marks an entry that the survey made because a companion was known: runs leave it out. */
export function ChosenForCompanion({ collaboration, target, onChanged }: ChosenForCompanionProps) {
  const [refusal, setRefusal] = useState<string>();
  const mark = async (selectedForCompanion: boolean) => {
    setRefusal(undefined);
    try {
      const opened = { selectedForCompanion: target.selectedForCompanion };
      await markTarget(collaboration, target.id, opened, { selectedForCompanion });
      onChanged();
    } catch (failure) {
      setRefusal(sentenceOf(failure));
      if (failure instanceof ChangedMeanwhile) onChanged();
    }
  };
  return (
    <div className="text-[14px]">
      <CheckboxField
        checked={target.selectedForCompanion}
        onChange={(event) => void mark(event.target.checked)}
        label="Chosen because a companion was known"
        hint="Left out of runs, unless their sample keeps such stars."
      />
      {refusal !== undefined && (
        <p role="alert" className="text-bad">
          {refusal}
        </p>
      )}
    </div>
  );
}
