'use client';

import { useRouter, useSearchParams } from 'next/navigation';
import { useRef, useState } from 'react';
import { ExportButton } from '@/components/exports/export-button';
import { sentenceOf } from '@/components/hooks/api-problem';
import { startMaps, useCompanions, useSurvey, useTargets } from '@/components/hooks/use-surveys';
import { useUnpacked } from '@/components/hooks/use-unpacked';
import { countOf } from '@/components/runs/level-table';
import { SharedNotice } from '@/components/sharing/shared-notice';
import { Button } from '@/components/ui/button';
import { EmptyState } from '@/components/ui/empty-state';
import { type Fact, FactsStrip } from '@/components/ui/facts-strip';
import { LinkButton } from '@/components/ui/link-button';
import { Notice } from '@/components/ui/notice';
import { PageTitle } from '@/components/ui/page-title';
import { StateMark } from '@/components/ui/state-mark';
import { Tabs } from '@/components/ui/tabs';
import { TextAction } from '@/components/ui/text-action';
import { describeLevel } from '@/lib/inference';
import { formatLimit } from '@/lib/quantities/display';
import type { Packed } from '@/lib/schemas/packed';
import type { BoxedDefinition } from '@/lib/schemas/populations';
import type { Shares } from '@/lib/schemas/sharing';
import type { CompanionView, SurveyLimit, SurveyView, TargetList } from '@/lib/schemas/surveys';
import type { UploadView } from '@/lib/schemas/uploads';
import { MapJobLine } from './map-job-line';
import { describeMapSettings } from './map-setting-words';
import { observedYears } from './observed-years';
import {
  CompanionTable,
  MapSettingsDialog,
  SurveyFactsDialog,
  SurveyMaps,
  SurveySharing,
  TargetPanel,
  TargetTable,
  UploadList,
} from './survey-parts';
import { YardstickWords, yardstickSource } from './yardstick-words';

interface SurveyScreenProps {
  collaboration: string;
  survey: SurveyView;
  targets: Packed<TargetList>;
  companions: CompanionView[];
  uploads: UploadView[];
  shares: Shares;
  coolingName: string | null;
  /** Of the yardstick, for its ranges on the map: detection probabilities are averages over it. */
  population: BoxedDefinition | null;
}

function factsOf(survey: SurveyView): Fact[] {
  const { companions } = survey;
  const open = companions.candidate + companions.ambiguous;
  return [
    { name: 'targets', value: survey.targets },
    { name: 'contrast curves', help: 'contrast-curve', value: survey.curves },
    {
      name: 'maps ready',
      help: 'completeness-map',
      value: survey.maps.ready,
      note: survey.maps.stale ? (
        <>
          of {survey.targets}, <StateMark kind="warn">{survey.maps.stale} stale</StateMark>
        </>
      ) : (
        `of ${survey.targets}`
      ),
    },
    { name: 'also in another survey', help: 'star', value: survey.alsoInAnother },
    {
      name: 'vetted detections',
      help: 'detection',
      value: companions.confirmed,
      note: open === 1 ? '1 open candidate' : `${open} open candidates`,
    },
    ...(survey.summedCompleteness === null
      ? []
      : [
          {
            name: 'sum of detection probabilities',
            help: 'exposure' as const,
            value: survey.summedCompleteness.toFixed(1),
            note: survey.yardstick && <YardstickWords yardstick={survey.yardstick} />,
          },
        ]),
    ...(survey.alone ? [limitFact(survey.alone)] : []),
  ];
}

/** What the survey would say without the others; the ranges and whose question stand beside it. */
function limitFact({ quantity, level, limit, ...of }: SurveyLimit): Fact {
  return {
    name: 'upper limit of this survey alone',
    help: 'upper-limit',
    value: formatLimit(limit, quantity),
    isBound: true,
    note: (
      <>
        ({describeLevel(level)}), {countOf(of.detections)}
        {of.isSetByPrior && (
          <>
            , <StateMark kind="warn">set by the prior</StateMark>
          </>
        )}
      </>
    ),
  };
}

/** Tabs beside which one target stands. */
const besideTarget = new Set(['targets', 'maps']);

const hasYears = (survey: SurveyView) => survey.observedFrom !== null || survey.observedTo !== null;

/** A description as part of a sentence: without its full stop, its first word in lower case. */
const asClause = (text: string) =>
  text.replace(/\.$/, '').replace(/^[A-Z](?=[a-z])/, (letter) => letter.toLowerCase());

/** One survey: what it holds, what is on its way, and each target with its curve and map. */
export function SurveyScreen(props: SurveyScreenProps) {
  const { collaboration, uploads, coolingName, population } = props;
  const { data: survey = props.survey, mutate } = useSurvey(
    collaboration,
    props.survey.slug,
    props.survey,
  );
  const isOpen = survey.mapJob?.status === 'running' || survey.mapJob?.status === 'waiting';
  const firstTargets = useUnpacked(props.targets);
  const { data: list = firstTargets, mutate: mutateTargets } = useTargets(
    collaboration,
    survey.slug,
    firstTargets,
    { isLive: isOpen, stamp: `${survey.maps.ready}-${survey.maps.failed}` },
  );
  const { data: companions = props.companions } = useCompanions(
    collaboration,
    survey.slug,
    props.companions,
  );
  const [selectedId, setSelectedId] = useState(useSearchParams().get('target'));
  const [refusal, setRefusal] = useState<string | null>(null);
  const [isSetting, setSetting] = useState(false);
  const [isChanging, setChanging] = useState(false);
  const panel = useRef<HTMLDivElement>(null);
  const selected =
    list.targets.find((target) => target.id === selectedId) ?? list.targets[0] ?? null;
  const [tab, setTab] = useState('targets');
  // Beside the lists of something else it would leave half of the page empty.
  const shown = besideTarget.has(tab) ? selected : null;
  const router = useRouter();
  const select = (id: string) => {
    setSelectedId(id);
    // Below the two columns the star's charts lie under a long table: take the reader there.
    const { current } = panel;
    if (current && current.getBoundingClientRect().top > window.innerHeight)
      current.scrollIntoView({ block: 'start' });
  };
  const importHref = `/${collaboration}/surveys/${survey.slug}/import`;
  const compute = async () => {
    setRefusal(null);
    try {
      await startMaps(collaboration, survey.slug);
      await mutate();
    } catch (reason) {
      setRefusal(sentenceOf(reason));
    }
  };
  const areMapsMissing = survey.maps.ready < survey.targets;
  const isStale = Boolean(survey.maps.stale);
  const remarks = list.targets.filter((target) => target.checks.length > 0);
  return (
    <>
      <PageTitle
        title={survey.name}
        crumbs={[{ href: `/${collaboration}/surveys`, label: 'Surveys' }, { label: survey.name }]}
        context={
          <>
            <i>{survey.band}</i> band{survey.description && `, ${asClause(survey.description)}`}
            {hasYears(survey) && `, observed ${observedYears(survey)}`};{' '}
            {survey.shared
              ? `shared by ${survey.shared.owner}`
              : `lead ${survey.lead?.name ?? 'nobody'}`}
            {survey.can.change && (
              <>
                {' '}
                <TextAction onClick={() => setChanging(true)}>
                  Change<span className="sr-only"> name, band, years and description</span>
                </TextAction>
              </>
            )}
            <span className="block text-ink3 text-note">
              Maps:{' '}
              {survey.shared?.scope === 'maps'
                ? `as ${survey.shared.owner} made them`
                : describeMapSettings(survey.mapSettings, coolingName)}{' '}
              {survey.can.change && (
                <TextAction onClick={() => setSetting(true)}>
                  Change<span className="sr-only"> how the maps are made</span>
                </TextAction>
              )}
            </span>
          </>
        }
        actions={
          <>
            {survey.targets > 0 && (
              <ExportButton
                collaboration={collaboration}
                source={['surveys', survey.slug]}
                title={`Files of ${survey.name}`}
              />
            )}
            {survey.can.import && (
              <>
                {survey.curves > 0 && (areMapsMissing || isStale) && !isOpen && (
                  <Button onClick={() => void compute()}>
                    {isStale
                      ? areMapsMissing
                        ? 'Compute the stale and missing maps'
                        : 'Compute the stale maps'
                      : 'Compute the missing maps'}
                  </Button>
                )}
                <LinkButton href={importHref} variant="primary" icon="add">
                  Import files
                </LinkButton>
              </>
            )}
          </>
        }
      />
      {refusal !== null && <Notice tone="bad" title={refusal} isAnnounced />}
      {survey.shared && (
        <SharedNotice
          collaboration={collaboration}
          name={survey.name}
          shared={survey.shared}
          onRefreshed={() => {
            void mutate();
            void mutateTargets();
            router.refresh();
          }}
        />
      )}
      {isChanging && (
        <SurveyFactsDialog
          collaboration={collaboration}
          survey={survey}
          isOpen
          onClose={() => setChanging(false)}
          onSaved={() => void mutate()}
        />
      )}
      {isSetting && (
        <MapSettingsDialog
          collaboration={collaboration}
          survey={survey}
          isOpen
          onClose={() => setSetting(false)}
          onSaved={() => {
            void mutate();
            router.refresh();
          }}
        />
      )}
      {survey.targets === 0 ? (
        <div className="mt-8">
          <EmptyState
            title="No target yet"
            actions={
              survey.can.import && (
                <LinkButton href={importHref} variant="primary" icon="add">
                  Import targets
                </LinkButton>
              )
            }
          >
            Start with the file of targets; contrast curves or ready maps and companions follow,
            each checked against the targets.
          </EmptyState>
        </div>
      ) : (
        <>
          <FactsStrip facts={factsOf(survey)} />
          <MapJobLine
            collaboration={collaboration}
            survey={survey}
            onChanged={() => void mutate()}
          />
          <div
            className={`mt-5 grid grid-cols-1 gap-x-10 gap-y-10 ${shown ? 'xl:grid-cols-[minmax(0,1fr)_minmax(340px,390px)]' : ''}`}
          >
            <Tabs
              label="Parts of the survey"
              selected={tab}
              onSelect={setTab}
              tabs={[
                {
                  id: 'targets',
                  label: 'Targets',
                  count: survey.targets,
                  content: (
                    <TargetTable
                      targets={list.targets}
                      yardstick={list.yardstick}
                      selectedId={selected?.id ?? null}
                      onSelect={select}
                    />
                  ),
                },
                {
                  id: 'maps',
                  label: 'Maps',
                  count: survey.maps.ready,
                  content: (
                    <SurveyMaps
                      collaboration={collaboration}
                      slug={survey.slug}
                      canRefresh={survey.can.import}
                      stamp={`${survey.maps.ready}-${survey.mapJob?.status}`}
                      onStarted={() => void mutate()}
                    />
                  ),
                },
                {
                  id: 'candidates',
                  label: 'Candidates',
                  count: companions.length,
                  content: <CompanionTable collaboration={collaboration} companions={companions} />,
                },
                {
                  id: 'checks',
                  label: 'Checks',
                  count: remarks.length,
                  content: (
                    <ul className="divide-y divide-rule">
                      {remarks.length === 0 && (
                        <li className="py-4 text-ink3">No remark on any target.</li>
                      )}
                      {remarks.map((target) => (
                        <li key={target.id} className="py-2">
                          <span className="whitespace-nowrap font-semibold">{target.name}</span>:{' '}
                          {target.checks.join('; ')}
                        </li>
                      ))}
                    </ul>
                  ),
                },
                {
                  id: 'files',
                  label: 'Files',
                  count: uploads.length,
                  content: (
                    <UploadList
                      collaboration={collaboration}
                      survey={survey.slug}
                      uploads={uploads}
                      canWithdraw={survey.can.import}
                      onChanged={() => {
                        void mutate();
                        void mutateTargets();
                        router.refresh();
                      }}
                    />
                  ),
                },
                ...(survey.shared
                  ? []
                  : [
                      {
                        id: 'sharing',
                        label: 'Sharing',
                        content: (
                          <SurveySharing
                            collaboration={collaboration}
                            survey={survey}
                            initial={props.shares}
                          />
                        ),
                      },
                    ]),
              ]}
            />
            {shown && (
              <div
                ref={panel}
                className="min-w-0 scroll-mt-4 xl:sticky xl:top-4 xl:max-h-[calc(100dvh-2rem)] xl:self-start xl:overflow-y-auto"
              >
                <TargetPanel
                  key={shown.id}
                  collaboration={collaboration}
                  survey={survey}
                  targets={list.targets}
                  companions={companions}
                  target={shown}
                  population={population}
                  source={population && yardstickSource(list.yardstick)}
                  onChanged={() => void mutateTargets()}
                />
              </div>
            )}
          </div>
        </>
      )}
    </>
  );
}
