'use client';

import { useSurveys } from '@/components/hooks/use-surveys';
import { EmptyState } from '@/components/ui/empty-state';
import { LinkButton } from '@/components/ui/link-button';
import type { SurveyList } from '@/lib/schemas/surveys';
import { SurveyTable } from './survey-table';

interface SurveyListPanelProps {
  collaboration: string;
  initial: SurveyList;
  canAdd: boolean;
}

/** The table of surveys; while maps are computed it follows their count. */
export function SurveyListPanel({ collaboration, initial, canAdd }: SurveyListPanelProps) {
  const { data: list = initial } = useSurveys(collaboration, initial);
  if (list.surveys.length === 0) {
    return (
      <EmptyState
        title="No survey yet"
        actions={
          canAdd && (
            <LinkButton href={`/${collaboration}/surveys/new`} variant="primary" icon="add">
              Add a survey
            </LinkButton>
          )
        }
      >
        Bring one file of targets (name, distance, age, each with its error) and one contrast curve
        a star, or ready completeness maps. Every line is checked before anything is stored.
      </EmptyState>
    );
  }
  return <SurveyTable collaboration={collaboration} list={list} isWholePage />;
}
