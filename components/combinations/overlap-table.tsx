'use client';

import { useState } from 'react';
import { SelectField } from '@/components/ui/select-field';
import { Cell, HeadCell, Row, Table, TableBody, TableHead } from '@/components/ui/table';
import { TextAction } from '@/components/ui/text-action';
import type {
  CombinationDefinition,
  CombinationPreview,
  StarRule,
} from '@/lib/schemas/combinations';

interface OverlapTableProps {
  preview: CombinationPreview;
  starRules: CombinationDefinition['starRules'];
  /** No star may follow another rule. */
  isFixed: boolean;
  onChange(starRules: CombinationDefinition['starRules']): void;
}

const FIRST = 25;

export const starRuleNames: Record<StarRule, string> = {
  'same-position': 'same position',
  deepest: 'deepest map',
  independent: 'independent epochs',
};
const rules = Object.keys(starRuleNames) as StarRule[];

/** The stars that several of the surveys list, each with its rule. */
export function OverlapTable({ preview, starRules, isFixed, onChange }: OverlapTableProps) {
  const [isWhole, setWhole] = useState(false);
  const { shared, surveys } = preview;
  if (shared.length === 0) {
    return <p className="py-2 text-ink2">No star is in two of these surveys.</p>;
  }
  const nameOf = new Map(surveys.map(({ id, name }) => [id, name]));
  const set = (starId: string, rule: string) => {
    const others = starRules.filter((star) => star.starId !== starId);
    const chosen = rules.find((one) => one === rule);
    onChange(chosen ? [...others, { starId, rule: chosen }] : others);
  };
  const ruleWords = (rule: StarRule) => starRuleNames[rule];
  return (
    <>
      <Table caption="Stars in several of the surveys, and the rule of each">
        <TableHead>
          <tr>
            <HeadCell>star</HeadCell>
            <HeadCell>listed by</HeadCell>
            <HeadCell>rule</HeadCell>
          </tr>
        </TableHead>
        <TableBody>
          {(isWhole ? shared : shared.slice(0, FIRST)).map((star) => {
            const own = starRules.find(({ starId }) => starId === star.starId)?.rule;
            return (
              <Row key={star.starId}>
                <Cell isRowHead className="whitespace-nowrap">
                  {star.name}
                </Cell>
                <Cell>{star.surveyIds.map((id) => nameOf.get(id)).join(', ')}</Cell>
                <Cell className="min-w-52">
                  {isFixed ? (
                    'refused'
                  ) : (
                    <SelectField
                      label={`Rule of ${star.name}`}
                      isLabelHidden
                      value={own ?? ''}
                      onChange={(event) => set(star.starId, event.target.value)}
                      options={[
                        {
                          value: '',
                          label: own ? 'as the rest' : `as the rest: ${ruleWords(star.rule)}`,
                        },
                        ...rules.map((rule) => ({
                          value: rule,
                          label: ruleWords(rule),
                          isDisabled: rule === 'same-position' && !star.canSamePosition,
                        })),
                      ]}
                    />
                  )}
                </Cell>
              </Row>
            );
          })}
        </TableBody>
      </Table>
      {shared.length > FIRST && !isWhole && (
        <p className="mt-2">
          <TextAction onClick={() => setWhole(true)}>Show all {shared.length} stars</TextAction>
        </p>
      )}
    </>
  );
}
