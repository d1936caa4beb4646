'use client';

import { SurveyCheckbox } from '@/components/surveys/survey-checkbox';
import { TextAction } from '@/components/ui/text-action';
import type { SurveyView } from '@/lib/schemas/surveys';

interface OrderChoiceProps {
  surveys: SurveyView[];
  /** In the order of the combination. */
  chosen: string[];
  onChange(ids: string[]): void;
}

/** Which surveys are taken together, and whose age and distance hold for a star that they share. */
export function OrderChoice({ surveys, chosen, onChange }: OrderChoiceProps) {
  const inOrder = [
    ...chosen.flatMap((id) => surveys.find((survey) => survey.id === id) ?? []),
    ...surveys.filter(({ id }) => !chosen.includes(id)),
  ];
  const raise = (id: string) => {
    const at = chosen.indexOf(id);
    const next = [...chosen];
    [next[at - 1], next[at]] = [next[at], next[at - 1]];
    onChange(next);
  };
  return (
    <fieldset>
      <legend className="mb-1 text-ink2 text-note">
        Surveys, in order: a shared star has the age and distance of its first
      </legend>
      {inOrder.map((survey) => {
        const place = chosen.indexOf(survey.id);
        return (
          <div key={survey.id} className="flex items-center justify-between gap-3">
            <SurveyCheckbox
              survey={survey}
              chosen={chosen}
              onChange={onChange}
              before={place >= 0 && <span className="text-ink3">{place + 1}</span>}
              after={<span className="text-ink3 text-note">{survey.targets} targets</span>}
            />
            {place > 0 && (
              <TextAction onClick={() => raise(survey.id)}>
                Move up<span className="sr-only"> {survey.name}</span>
              </TextAction>
            )}
          </div>
        );
      })}
    </fieldset>
  );
}
