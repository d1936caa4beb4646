'use client';

import { useRouter } from 'next/navigation';
import { useMemo, useState } from 'react';
import { sentenceOf } from '@/components/hooks/api-problem';
import { useAction } from '@/components/hooks/use-action';
import {
  changeAnalysis,
  createAnalysis,
  type NameAndRecipe,
} from '@/components/hooks/use-analyses';
import { useEditing } from '@/components/hooks/use-editing';
import { startRun } from '@/components/hooks/use-runs';
import { CHECKS_COME, useSchema } from '@/components/hooks/use-schema';
import { useCompanionsOf } from '@/components/hooks/use-surveys';
import { useUnpackedRun } from '@/components/hooks/use-unpacked';
import { recipeWords } from '@/components/runs/recipe-words';
import { Button } from '@/components/ui/button';
import { ChangedNotice } from '@/components/ui/form/changed-notice';
import { Notice } from '@/components/ui/notice';
import { PageTitle } from '@/components/ui/page-title';
import { TextField } from '@/components/ui/text-field';
import type { AnalysisRecipe, AnalysisView } from '@/lib/schemas/analyses';
import type { CombinationView } from '@/lib/schemas/combinations';
import type { PackedRun } from '@/lib/schemas/packed-run';
import { isPlainPowerLaw } from '@/lib/schemas/plain-power-law';
import type { ListedPopulation } from '@/lib/schemas/populations';
import type { SurveyList } from '@/lib/schemas/surveys';
import { CandidateChoice } from './candidate-choice';
import { CombinationChoice } from './combination-choice';
import { CombinationLine, isSameCombination } from './combination-line';
import { DetectionsChoice } from './detections-choice';
import { Estimate } from './estimate';
import { ReportFault, useFaultyFields } from './faulty-fields';
import { suggestName } from './name-words';
import { tallyOpen } from './open-candidates';
import { PopulationChoice } from './population-choice';
import { RateChoice, type RateSetting } from './rate-choice';
import { SampleChoice } from './sample-choice';
import { countStars, SurveyChoice } from './survey-choice';

interface NewAnalysisProps {
  collaboration: string;
  surveys: SurveyList;
  populations: ListedPopulation[];
  /** Finished run with the most stars: its maps give the estimate. */
  previewRun: PackedRun | null;
  /** Population asked for in the address. */
  wanted?: string;
  /** Stored combination asked for in the address. */
  stored?: CombinationView;
  /** What the settings of the collaboration say that new analyses begin with. */
  usual: Pick<AnalysisRecipe, 'credibleLevel' | 'combination'>;
  /** An analysis that is changed; a new one without it. */
  draft?: AnalysisView;
}

const loadSchema = async () => (await import('@/lib/schemas/analyses')).analysisRecipeSchema;

const FIRST_RATE: Omit<RateSetting, 'credibleLevel'> = {
  likelihood: 'host-fraction',
  prior: { law: 'uniform', max: 1 },
};

const rateOf = ({ likelihood, prior, credibleLevel, background }: AnalysisRecipe): RateSetting => ({
  likelihood,
  prior,
  credibleLevel,
  background,
});

/** One page, four choices with sensible defaults, and what they would give. */
export function NewAnalysis(props: NewAnalysisProps) {
  const { collaboration, surveys, populations, wanted, stored, usual, draft } = props;
  const before = draft?.recipe;
  const previewRun = useUnpackedRun(props.previewRun);
  const router = useRouter();
  const offered = surveys.surveys.filter(
    (survey) => !survey.isArchived || before?.surveyIds.includes(survey.id),
  );
  const ready = offered.filter((survey) => survey.maps.ready > 0);
  const [chosen, setChosen] = useState<string[]>(
    before?.surveyIds ??
      stored?.definition.surveyIds ??
      (ready.length > 0 ? ready : offered).map((survey) => survey.id),
  );
  const [populationId, setPopulationId] = useState(
    before?.populationId ??
      (
        populations.find((population) => population.id === wanted || population.key === wanted) ??
        populations[0]
      )?.id ??
      '',
  );
  const [detections, setDetections] = useState<AnalysisRecipe['detections']>(
    before?.detections ?? 'counted',
  );
  const [candidates, setCandidates] = useState(before?.candidates);
  const [combination, setCombination] = useState<AnalysisRecipe['combination']>(
    before?.combination ?? stored?.definition.rule ?? usual.combination,
  );
  const [sampleId, setSampleId] = useState(before?.sampleId);
  const [rate, setRate] = useState<RateSetting>(
    before ? rateOf(before) : { ...FIRST_RATE, credibleLevel: usual.credibleLevel },
  );
  const [zeroOutsideMaps, setZeroOutsideMaps] = useState(before?.zeroOutsideMaps ?? false);
  const [ownName, setOwnName] = useState(draft?.name);
  const editing = useEditing<NameAndRecipe | undefined>(draft);
  const { perform, isBusy, problem } = useAction({ leaves: true });
  const [pressed, setPressed] = useState<'create' | 'run'>();

  const population = populations.find((candidate) => candidate.id === populationId);
  const chosenSurveys = offered.filter((survey) => chosen.includes(survey.id));
  const companions = useCompanionsOf(
    collaboration,
    chosenSurveys.map(({ slug }) => slug),
  );
  const tally = useMemo(
    () => population && companions.data && tallyOpen(companions.data, population.definition),
    [population, companions.data],
  );
  const name = ownName ?? (population ? suggestName(population.definition, chosen.length) : '');
  const recipe = {
    surveyIds: chosen,
    populationId,
    ...rate,
    detections,
    combination,
    zeroOutsideMaps,
    ...(sampleId && { sampleId }),
    ...(stored && isSameCombination(stored, chosen, combination) && { combinationId: stored.id }),
    ...(candidates && detections === 'counted' && { candidates }),
  };
  const checked = useSchema(loadSchema)?.safeParse(recipe);
  const faulty = useFaultyFields();
  const fault = checked
    ? (faulty.words ?? faultWords(checked.error?.issues[0], name))
    : CHECKS_COME;

  const create = async (andRun: boolean) => {
    if (!checked?.success || fault !== undefined) return;
    setPressed(andRun ? 'run' : 'create');
    await perform(async () => {
      const key = await store({ name, recipe: checked.data });
      if (key === null) return;
      if (andRun) await startRun(collaboration, key);
      router.push(`/${collaboration}/analyses/${key}`);
    });
  };
  /** The key of what was stored; null where somebody else has changed it meanwhile. */
  const store = async (mine: NameAndRecipe) => {
    if (draft === undefined) return (await createAnalysis(collaboration, mine)).key;
    const isStored = await editing.attempt(mine, (opened = draft) =>
      changeAnalysis(collaboration, draft.key, opened, mine),
    );
    return isStored ? draft.key : null;
  };
  const take = (now: NameAndRecipe | undefined) => {
    if (now === undefined) return;
    const { recipe: theirs } = now;
    setOwnName(now.name);
    setChosen(theirs.surveyIds);
    setPopulationId(theirs.populationId);
    setDetections(theirs.detections);
    setCandidates(theirs.candidates);
    setCombination(theirs.combination);
    setSampleId(theirs.sampleId);
    setRate(rateOf(theirs));
    setZeroOutsideMaps(theirs.zeroOutsideMaps);
  };
  // After a conflict the person decides, so nothing is under way.
  const isUnderWay = isBusy && editing.conflict === null;

  return (
    <ReportFault value={faulty.report}>
      <PageTitle
        title={draft ? `Change ${draft.key}` : 'New analysis'}
        crumbs={[
          { href: `/${collaboration}/analyses`, label: 'Analyses' },
          ...(draft ? [{ href: `/${collaboration}/analyses/${draft.key}`, label: draft.key }] : []),
          { label: draft ? 'Change' : 'New' },
        ]}
        context="Four choices; each can be changed until the first run, and each run keeps its own copy of them."
      />
      <div className="grid gap-x-14 gap-y-8 xl:grid-cols-[1fr_400px]">
        <div className="grid min-w-0 gap-8">
          <div className="min-w-0">
            <SurveyChoice
              surveys={offered}
              overlaps={surveys.overlaps}
              chosen={chosen}
              onChange={setChosen}
              address={`/${collaboration}/surveys`}
            >
              <CombinationChoice chosen={combination} onChange={setCombination} />
            </SurveyChoice>
            {stored && (
              <CombinationLine
                stored={stored}
                isUsed={isSameCombination(stored, chosen, combination)}
              />
            )}
            <SampleChoice
              collaboration={collaboration}
              surveyIds={chosen}
              chosen={sampleId}
              onChange={setSampleId}
            />
          </div>
          <PopulationChoice
            collaboration={collaboration}
            populations={populations}
            chosen={populationId}
            onChange={setPopulationId}
            grid={previewRun?.inputs?.grid}
            zeroOutsideMaps={zeroOutsideMaps}
            onZeroOutsideMaps={setZeroOutsideMaps}
          />
          <DetectionsChoice chosen={detections} surveys={chosenSurveys} onChange={setDetections}>
            <CandidateChoice
              chosen={candidates}
              likelihood={rate.likelihood}
              tally={tally}
              fault={companions.error === undefined ? undefined : sentenceOf(companions.error)}
              onChange={setCandidates}
            />
          </DetectionsChoice>
          <RateChoice
            {...rate}
            collaboration={collaboration}
            surveyIds={chosen}
            onChange={setRate}
          />
        </div>
        <aside className="min-w-0 xl:sticky xl:top-6 xl:self-start">
          <Estimate
            collaboration={collaboration}
            run={previewRun}
            surveys={chosenSurveys}
            chosenStars={countStars(surveys.overlaps, chosenSurveys)}
            needsRun={
              sampleId !== undefined ||
              stored !== undefined ||
              (population !== undefined && !isPlainPowerLaw(population.definition))
            }
            expected={
              checked === undefined && population && isPlainPowerLaw(population.definition)
                ? { definition: population.definition, credibleLevel: rate.credibleLevel }
                : undefined
            }
            setting={
              sampleId === undefined &&
              stored === undefined &&
              checked?.success &&
              population &&
              isPlainPowerLaw(population.definition)
                ? { ...recipe, definition: population.definition }
                : undefined
            }
          />
          <div className="mt-6 grid gap-4">
            <TextField
              label="Name"
              value={name}
              maxLength={120}
              onChange={(event) => setOwnName(event.target.value)}
            />
            {draft && (
              <ChangedNotice
                editing={editing}
                words={(one) =>
                  one === undefined ? {} : { Name: one.name, ...recipeWords(one.recipe, draft) }
                }
                onTake={take}
                onKeep={() => void create(pressed === 'run')}
              />
            )}
            {problem !== undefined && (
              <Notice
                tone="bad"
                title={draft ? 'It was not saved.' : 'It was not created.'}
                isAnnounced
              >
                {problem}
              </Notice>
            )}
            <div className="flex flex-wrap gap-2">
              <Button
                variant="primary"
                onClick={() => create(true)}
                isBusy={isUnderWay && pressed === 'run'}
                disabledReason={fault}
              >
                {draft ? 'Save and run' : 'Create and run'}
              </Button>
              <Button
                onClick={() => create(false)}
                isBusy={isUnderWay && pressed === 'create'}
                disabledReason={fault}
              >
                {draft ? 'Save' : 'Create without a run'}
              </Button>
            </div>
          </div>
        </aside>
      </div>
    </ReportFault>
  );
}

function faultWords(
  issue: { path: PropertyKey[]; message: string } | undefined,
  name: string,
): string | undefined {
  if (name.trim() === '') return 'Give it a name first.';
  if (issue === undefined) return undefined;
  const [field, part] = issue.path;
  if (field === 'surveyIds') return 'Choose at least one survey.';
  if (field === 'populationId') return 'Choose a population.';
  if (field === 'background') return 'The false detections expected must be a number above 0.';
  if (field === 'prior' && part === 'value') {
    return 'Choose the run whose posterior is the prior.';
  }
  if (field === 'credibleLevel') return 'The level must be more than 0 and less than 100 %.';
  return `${String(field)}${part === undefined ? '' : `, ${String(part)}`}: ${issue.message}.`;
}
