'use client';

import type { ReactNode } from 'react';
import { SurveyCheckbox } from '@/components/surveys/survey-checkbox';
import { EmptyState } from '@/components/ui/empty-state';
import { LinkButton } from '@/components/ui/link-button';
import { SectionOpener } from '@/components/ui/section-opener';
import type { SurveyList, SurveyView } from '@/lib/schemas/surveys';

interface SurveyChoiceProps {
  surveys: SurveyView[];
  overlaps: SurveyList['overlaps'];
  chosen: string[];
  onChange(ids: string[]): void;
  /** Where surveys are made. */
  address: string;
  /** What follows the list: the rule for stars in several of them. */
  children?: ReactNode;
}

export function SurveyChoice(props: SurveyChoiceProps) {
  const { surveys, overlaps, chosen, onChange, address } = props;
  const picked = surveys.filter((survey) => chosen.includes(survey.id));
  const entries = picked.reduce((sum, survey) => sum + survey.targets, 0);
  const stars = countStars(overlaps, picked);
  return (
    <section>
      <SectionOpener
        number={1}
        title="Surveys"
        help="survey"
        context={picked.length === 0 ? 'none chosen yet' : `${entries} entries, ${stars} stars`}
      />
      {surveys.length === 0 ? (
        <EmptyState
          title="No survey yet"
          actions={
            <LinkButton href={address} variant="primary" icon="add">
              Add a survey
            </LinkButton>
          }
        >
          An analysis needs at least one survey whose completeness maps are ready.
        </EmptyState>
      ) : (
        <div className="grid gap-1">
          {surveys.map((survey) => (
            <SurveyCheckbox
              key={survey.id}
              survey={survey}
              chosen={chosen}
              onChange={onChange}
              hint={surveyWords(survey)}
            />
          ))}
          <p className="mt-1 text-ink3 text-note">
            A star in several surveys counts once, with one combined map.
          </p>
          {picked.length > 1 && props.children}
        </div>
      )}
    </section>
  );
}

/** Every star once: the overlaps list each set of surveys with the stars that are in just those. */
export function countStars(overlaps: SurveyList['overlaps'], picked: SurveyView[]): number {
  const names = new Set(picked.flatMap((survey) => [survey.slug, survey.name, survey.id]));
  return overlaps
    .filter((set) => set.surveys.some((survey) => names.has(survey)))
    .reduce((sum, set) => sum + set.stars, 0);
}

export function surveyWords(survey: Pick<SurveyView, 'maps' | 'targets' | 'band'>): string {
  const { ready, waiting, failed, stale } = survey.maps;
  const missing = survey.targets - ready;
  const parts = [`${survey.targets} targets in ${survey.band}`];
  parts.push(missing === 0 ? 'all maps made' : `${ready} maps made`);
  if (stale) parts.push(`${stale} of them stale: refresh them first (survey, Maps)`);
  if (waiting > 0) parts.push(`${waiting} being computed`);
  if (failed > 0) parts.push(`${failed} failed`);
  return parts.join(', ');
}
