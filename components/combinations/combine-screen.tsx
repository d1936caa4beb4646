'use client';

import { useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import {
  createCombination,
  useCombinationPreview,
  useCombinations,
} from '@/components/hooks/use-combinations';
import { CHECKS_COME, useSchema } from '@/components/hooks/use-schema';
import { SaveVersion, useVersionSave } from '@/components/samples/save-version';
import { LinkButton } from '@/components/ui/link-button';
import { Notice } from '@/components/ui/notice';
import { PageTitle } from '@/components/ui/page-title';
import { SectionOpener } from '@/components/ui/section-opener';
import { SelectField } from '@/components/ui/select-field';
import { TextAction } from '@/components/ui/text-action';
import { ruleNames } from '@/lib/schemas/combination-words';
import type {
  CombinationDefinition,
  CombinationPreview,
  CombinationRule,
  CombinationView,
} from '@/lib/schemas/combinations';
import type { SurveyView } from '@/lib/schemas/surveys';
import { CombinationReport } from './combination-report';
import { CombinationTable } from './combination-table';
import { OrderChoice } from './order-choice';
import { OverlapTable } from './overlap-table';

const loadSchema = async () =>
  (await import('@/lib/schemas/combinations')).combinationDefinitionSchema;
const rules = Object.keys(ruleNames) as CombinationRule[];

interface CombineScreenProps {
  collaboration: string;
  surveys: SurveyView[];
  initial: CombinationView[];
  canCombine: boolean;
  /** What a new combination begins with; without its counts where it is not one yet. */
  first: { definition: CombinationDefinition; preview?: CombinationPreview };
}

/** Several surveys as one sample: order, rule for shared stars, grid, and what each survey adds. */
export function CombineScreen({
  collaboration,
  surveys,
  initial,
  canCombine,
  first,
}: CombineScreenProps) {
  const { data: combinations = initial, mutate } = useCombinations(collaboration, initial);
  const [draft, setDraft] = useState(first.definition);
  const checked = useSchema(loadSchema)?.safeParse(draft);
  const isFirst = draft === first.definition && first.preview !== undefined;
  // The page has checked what it begins with: its counts need not wait for the schema.
  const definition = isFirst ? draft : checked?.data;
  const {
    data: preview,
    error,
    isLoading,
  } = useCombinationPreview(collaboration, definition, isFirst ? first.preview : undefined);
  const saving = useVersionSave<CombinationView>(async ({ name, versionOf }) => {
    if (!definition) throw new Error('what is saved was not checked');
    const saved = await createCombination(collaboration, { name, definition, versionOf });
    await mutate();
    return saved;
  });
  const { open } = saving;
  const change = (part: Partial<CombinationDefinition>) => setDraft({ ...draft, ...part });
  const fault = !checked
    ? CHECKS_COME
    : checked.error
      ? `${checked.error.issues[0].message}.`
      : saving.name.trim() === ''
        ? 'Give it a name first.'
        : canCombine
          ? undefined
          : 'A statistician, a collaborator or an owner saves combinations.';

  const show = (combination: CombinationView) => {
    saving.show(combination);
    setDraft(combination.definition);
  };
  const takeSurveys = (surveyIds: string[]) =>
    change({
      surveyIds,
      ...(draft.grid.choice === 'survey' &&
        !surveyIds.includes(draft.grid.surveyId) && { grid: { choice: 'common' as const } }),
    });

  return (
    <>
      <PageTitle
        title="Combine surveys"
        crumbs={[{ href: `/${collaboration}/surveys`, label: 'Surveys' }, { label: 'Combine' }]}
        context="A star in several surveys counts once, with one map made by the rule that you choose."
      />
      <div className="grid gap-x-14 gap-y-8 pb-10 xl:grid-cols-[420px_1fr]">
        <section className="min-w-0">
          <SectionOpener
            number={1}
            title="Surveys and rule"
            context={open ? `${open.key}, version ${open.version}` : 'a new combination'}
            tools={open && <TextAction onClick={saving.close}>As a new one</TextAction>}
          />
          <div className="grid gap-5">
            <OrderChoice surveys={surveys} chosen={draft.surveyIds} onChange={takeSurveys} />
            <SelectField
              label="A star in several surveys"
              hint={draft.rule === 'default' ? `By default ${ruleNames.default}` : undefined}
              value={draft.rule}
              onChange={(event) => {
                const rule = rules.find((one) => one === event.target.value) ?? draft.rule;
                change({ rule, ...(rule === 'refuse' && { starRules: [] }) });
              }}
              options={rules.map((rule) => ({
                value: rule,
                label: rule === 'default' ? 'same position, else the deepest map' : ruleNames[rule],
              }))}
            />
            <SelectField
              label="Grid of masses and semi-major axes"
              value={draft.grid.choice === 'survey' ? draft.grid.surveyId : ''}
              onChange={({ target: { value } }) =>
                change({
                  grid: value === '' ? { choice: 'common' } : { choice: 'survey', surveyId: value },
                })
              }
              options={[
                { value: '', label: 'the nodes of all its maps together' },
                ...draft.surveyIds.map((id) => ({
                  value: id,
                  label: `that of ${surveys.find((survey) => survey.id === id)?.name ?? 'a deleted survey'}`,
                })),
              ]}
            />
            <SaveVersion
              saving={saving}
              noun="combination"
              canSaveVersion={open?.isLatest === true}
              fault={fault}
            >
              {open && (
                <LinkButton href={`/${collaboration}/analyses/new?combination=${open.id}`}>
                  New analysis with {open.key}
                </LinkButton>
              )}
            </SaveVersion>
          </div>
        </section>
        <div className="grid min-w-0 content-start gap-8">
          <section className={`min-w-0 ${isLoading ? 'opacity-60' : ''}`} aria-busy={isLoading}>
            <SectionOpener number={2} title="What each survey adds" />
            {error !== undefined && (
              <Notice tone="bad" title="It could not be counted.">
                {sentenceOf(error)}
              </Notice>
            )}
            {preview ? (
              <CombinationReport preview={preview} />
            ) : (
              // What follows stays out of sight, so that nothing jumps once the counts are there.
              <p className={`text-ink3 ${draft.surveyIds.length > 1 ? 'min-h-screen' : ''}`}>
                {draft.surveyIds.length > 1
                  ? 'The surveys are being laid together.'
                  : 'Choose two surveys.'}
              </p>
            )}
          </section>
          {preview && (
            <section className="min-w-0">
              <SectionOpener number={3} title="Overlaps" context="a rule for each star" />
              <OverlapTable
                preview={preview}
                starRules={draft.starRules}
                isFixed={draft.rule === 'refuse'}
                onChange={(starRules) => change({ starRules })}
              />
            </section>
          )}
          <section className="min-w-0">
            <SectionOpener number={4} title="Saved" context="a version never changes" />
            <CombinationTable combinations={combinations} openId={open?.id} onOpen={show} />
          </section>
        </div>
      </div>
    </>
  );
}
