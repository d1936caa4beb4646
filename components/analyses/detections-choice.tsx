'use client';

import { ConsequenceSwitch } from '@/components/ui/consequence-switch';
import { SectionOpener } from '@/components/ui/section-opener';
import type { AnalysisRecipe } from '@/lib/schemas/analyses';
import type { SurveyView } from '@/lib/schemas/surveys';

interface DetectionsChoiceProps {
  chosen: AnalysisRecipe['detections'];
  surveys: SurveyView[];
  onChange(detections: AnalysisRecipe['detections']): void;
}

export function DetectionsChoice({ chosen, surveys, onChange }: DetectionsChoiceProps) {
  const sum = (kind: 'confirmed' | 'candidate' | 'ambiguous') =>
    surveys.reduce((total, survey) => total + survey.companions[kind], 0);
  const undecided = sum('candidate') + sum('ambiguous');
  return (
    <section>
      <SectionOpener number={3} title="Detections" />
      <ConsequenceSwitch
        label="Detections counted"
        isLabelHidden
        value={chosen}
        onChange={onChange}
        options={[
          { value: 'counted', label: 'confirmed companions inside the ranges' },
          { value: 'none', label: 'none, set aside' },
        ]}
      />
      <p className="mt-2 text-ink3 text-note">
        {sum('confirmed')} confirmed in these surveys, {undecided} undecided. Undecided ones never
        count; they are named beside the number.
      </p>
    </section>
  );
}
