import type { ReactNode } from 'react';
import { seriesColour } from '@/components/charts/series';
import { CheckboxField } from '@/components/ui/checkbox-field';

interface SurveyCheckboxProps {
  survey: { id: string; name: string; position: number };
  chosen: string[];
  onChange(ids: string[]): void;
  /** Beside its name. */
  before?: ReactNode;
  after?: ReactNode;
  hint?: string;
}

/** One survey of several, with the colour that it has everywhere. */
export function SurveyCheckbox(props: SurveyCheckboxProps) {
  const { survey, chosen, onChange, before, after, hint } = props;
  return (
    <CheckboxField
      checked={chosen.includes(survey.id)}
      onChange={(event) =>
        onChange(
          event.target.checked ? [...chosen, survey.id] : chosen.filter((id) => id !== survey.id),
        )
      }
      label={
        <span className={`inline-flex items-center gap-2 ${hint ? 'font-semibold' : ''}`}>
          <span
            aria-hidden="true"
            className="size-[11px]"
            style={{ backgroundColor: seriesColour(survey.position) }}
          />
          {before}
          {survey.name}
          {after}
        </span>
      }
      hint={hint}
    />
  );
}
