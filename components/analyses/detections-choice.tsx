'use client';

import type { ReactNode } from 'react';
import { ConsequenceSwitch } from '@/components/ui/consequence-switch';
import { SectionOpener } from '@/components/ui/section-opener';
import type { AnalysisRecipe } from '@/lib/schemas/analyses';
import type { SurveyView } from '@/lib/schemas/surveys';

interface DetectionsChoiceProps {
  /** What is done with candidates without an answer; none counts where detections are set aside. */
  children: ReactNode;
  chosen: AnalysisRecipe['detections'];
  surveys: SurveyView[];
  onChange(detections: AnalysisRecipe['detections']): void;
}

export function DetectionsChoice({ chosen, surveys, onChange, children }: DetectionsChoiceProps) {
  const confirmed = surveys.reduce((total, survey) => total + survey.companions.confirmed, 0);
  return (
    <section>
      <SectionOpener number={3} title="Detections" help="detection" />
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
        {confirmed} confirmed in these surveys; those inside the ranges count.
        {chosen === 'none' && ' With all detections set aside, candidates are set aside too.'}
      </p>
      {chosen === 'counted' && children}
    </section>
  );
}
