'use client';

import { useRouter } from 'next/navigation';
import { useAction } from '@/components/hooks/use-action';
import { removeAnalysis } from '@/components/hooks/use-analyses';
import { startRun } from '@/components/hooks/use-runs';
import { AxisRange, MassRange, PowerLaws } from '@/components/populations/law-notation';
import { Button } from '@/components/ui/button';
import { DeleteForGood } from '@/components/ui/delete-for-good';
import { LinkButton } from '@/components/ui/link-button';
import { Notice } from '@/components/ui/notice';
import { Conditions, Plate } from '@/components/ui/plate';
import {
  describeLevel,
  describePlanet,
  describePlanets,
  describePrior,
  describeStars,
} from '@/lib/inference';
import type { AnalysisView } from '@/lib/schemas/analyses';
import { quantityOf } from './live-setting';

interface NoRunPlateProps {
  collaboration: string;
  analysis: AnalysisView;
  isOnItsWay: boolean;
  /** It was started, or it is not as it was shown. */
  onChanged(): void;
}

/** The question stands, its answer does not yet: a dotted posterior and the way to it. */
export function NoRunPlate({ collaboration, analysis, isOnItsWay, onChanged }: NoRunPlateProps) {
  const router = useRouter();
  const { perform, isBusy, problem } = useAction();
  const { recipe, population, surveys } = analysis;
  const quantity = quantityOf(recipe.likelihood);

  const run = () =>
    perform(async () => {
      await startRun(collaboration, analysis.key);
      onChanged();
    });

  return (
    <>
      <Plate className="grid gap-x-[26px] gap-y-6 xl:grid-cols-[440px_1fr]">
        <div>
          <p className="text-ink3">
            <span className="mr-[9px]">1</span>
            {isOnItsWay ? 'The first run is on its way' : 'No run yet'}
          </p>
          <p className="statement mt-4 mb-5">
            {quantity === 'host_fraction'
              ? `What share of ${describeStars(population.definition)} hosts`
              : `How many per 100 ${describeStars(population.definition)} are there of`}{' '}
            {population.definition.form === 'systems' ? (
              <b>
                {quantity === 'host_fraction' ? 'one ' : ''}
                {quantity === 'host_fraction'
                  ? describePlanet(population.definition)
                  : describePlanets(population.definition)}
              </b>
            ) : (
              <>
                {quantity === 'host_fraction' ? 'at least one planet of' : 'planets of'}{' '}
                <b>
                  <MassRange definition={population.definition} />
                </b>{' '}
                at{' '}
                <b>
                  <AxisRange definition={population.definition} />
                </b>
              </>
            )}
            ?
          </p>
          <Conditions
            rows={[
              { name: 'Surveys', value: surveys.map((survey) => survey.name).join(', ') },
              { name: 'Level', value: describeLevel(recipe.credibleLevel) },
              { name: 'Prior', value: describePrior(recipe.prior, quantity) },
              {
                name: 'Population',
                value: <PowerLaws definition={population.definition} />,
              },
              {
                name: 'Detections',
                value:
                  recipe.detections === 'none'
                    ? 'none counted: set aside'
                    : 'confirmed companions inside the ranges',
              },
            ]}
          />
          {!isOnItsWay && (
            <div className="mt-6 flex flex-wrap items-start gap-x-2 gap-y-3">
              <Button
                variant="primary"
                onClick={run}
                isBusy={isBusy}
                disabledReason={
                  analysis.can.run
                    ? undefined
                    : 'Only whoever made this analysis, a statistician, an author or an owner can run it. Copy it and run the copy.'
                }
              >
                Run
              </Button>
              {analysis.can.change && (
                <LinkButton href={`/${collaboration}/analyses/new?draft=${analysis.key}`}>
                  Change
                </LinkButton>
              )}
              {analysis.can.remove && (
                <DeleteForGood
                  label="Delete the draft"
                  warning="The draft goes for good, with any notes on it."
                  onDelete={() => removeAnalysis(collaboration, analysis.key, recipe)}
                  onDeleted={() => {
                    router.push(`/${collaboration}/analyses`);
                    router.refresh();
                  }}
                  onRefused={onChanged}
                />
              )}
            </div>
          )}
        </div>
        <EmptyPosterior />
      </Plate>
      {problem !== undefined && (
        <div className="mt-4">
          <Notice tone="bad" title="The run was not started." isAnnounced>
            {problem}
          </Notice>
        </div>
      )}
    </>
  );
}

/** Real axis, dotted curve: what will stand here. */
function EmptyPosterior() {
  return (
    <svg
      className="h-auto w-full self-end"
      viewBox="0 0 820 340"
      fill="none"
      role="img"
      aria-label="A posterior that is not computed yet"
    >
      <path
        d="M8 300C90 300 100 70 210 70S380 292 812 299"
        stroke="var(--ink3)"
        strokeWidth="1.8"
        strokeDasharray="4 6"
      />
      <path d="M520 90V300" stroke="var(--ink3)" strokeWidth="3" strokeDasharray="6 5" />
      <path d="M8 300.5H812M8 300v8M209 300v8M410 300v8M611 300v8M812 300v8" stroke="var(--ink2)" />
    </svg>
  );
}
