'use client';

import { useMemo, useState } from 'react';
import { CompletenessMapChart } from '@/components/charts/completeness-map-chart';
import { ContrastChart } from '@/components/charts/contrast-chart';
import { MassLimitChart } from '@/components/charts/mass-limit-chart';
import { RampKey } from '@/components/charts/ramp-key';
import { sentenceOf } from '@/components/hooks/api-problem';
import { useEditing } from '@/components/hooks/use-editing';
import { markTarget, useMap } from '@/components/hooks/use-surveys';
import { AxisRange, MassRange, PowerLaws } from '@/components/populations/law-notation';
import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { ChangedNotice } from '@/components/ui/form/changed-notice';
import { Notice } from '@/components/ui/notice';
import { SectionOpener } from '@/components/ui/section-opener';
import { TextAction } from '@/components/ui/text-action';
import { TextField } from '@/components/ui/text-field';
import type { BoxedDefinition } from '@/lib/schemas/populations';
import type { CompanionView, SurveyView, TargetView } from '@/lib/schemas/surveys';
import { ChosenForCompanion } from './chosen-for-companion';
import { formatErrorPart, formatMeasured } from './measured';

interface TargetPanelProps {
  collaboration: string;
  survey: SurveyView;
  targets: TargetView[];
  companions: CompanionView[];
  target: TargetView;
  /** Whose ranges are drawn on the map; null where lists have no sum of probabilities. */
  population: BoxedDefinition | null;
  /** Where that population comes from, in words. */
  source: string | null;
  onChanged(): void;
}

function factsOf(target: TargetView): string {
  const parts: string[] = [];
  if (target.spectralType) parts.push(target.spectralType);
  if (target.distancePc !== null)
    parts.push(
      target.distanceErrorPc === null
        ? `${formatMeasured(target.distancePc, null)} pc`
        : `${formatMeasured(target.distancePc, target.distanceErrorPc)} ± ${formatErrorPart(target.distanceErrorPc)} pc`,
    );
  if (target.ageMyr !== null) {
    const error = target.ageUpperMyr === null ? null : target.ageUpperMyr - target.ageMyr;
    const part = error === null ? '?' : formatErrorPart(error);
    parts.push(`${formatMeasured(target.ageMyr, error)} ± ${part} Myr`);
  }
  parts.push(target.movingGroup ?? 'field');
  return parts.join(', ');
}

function LeaveOut({
  collaboration,
  target,
  onChanged,
}: Pick<TargetPanelProps, 'collaboration' | 'target' | 'onChanged'>) {
  const [isOpen, setOpen] = useState(false);
  const [reason, setReason] = useState('');
  const [refusal, setRefusal] = useState<string | null>(null);
  const editing = useEditing(target.leftOutReason);
  const apply = async (next: string | null) => {
    setRefusal(null);
    try {
      await editing.attempt(next, async (leftOutReason) => {
        await markTarget(collaboration, target.id, { leftOutReason }, { leftOutReason: next });
        setOpen(false);
        onChanged();
      });
    } catch (failure) {
      setRefusal(sentenceOf(failure));
    }
  };
  const newer = (
    <ChangedNotice
      editing={editing}
      words={(held) => ({ Reason: held ?? 'none: it is in' })}
      onTake={onChanged}
      onKeep={() => void apply(target.leftOutReason === null ? reason : null)}
    />
  );
  if (target.leftOutReason !== null) {
    return (
      <>
        <TextAction onClick={() => void apply(null)}>Take it back in</TextAction>
        {newer}
      </>
    );
  }
  return (
    <>
      <TextAction onClick={() => setOpen(true)}>Leave out with a reason</TextAction>
      <Dialog
        isOpen={isOpen}
        onClose={() => setOpen(false)}
        title={`Leave ${target.name} out?`}
        actions={
          <>
            <Button
              variant="primary"
              disabledReason={
                reason.trim() === ''
                  ? 'State the reason; it stands beside every later run'
                  : undefined
              }
              onClick={() => void apply(reason)}
            >
              Leave it out
            </Button>
            <Button onClick={() => setOpen(false)}>Keep it</Button>
          </>
        }
      >
        <p className="mb-3 text-ink2">
          Later runs go without this entry and say so. Runs that are there do not change.
        </p>
        <TextField
          label="Reason"
          value={reason}
          maxLength={300}
          onChange={(event) => setReason(event.target.value)}
        />
        {newer}
        {refusal !== null && <Notice tone="bad" title={refusal} isAnnounced />}
      </Dialog>
    </>
  );
}

/** The chosen target: its curves among those of the survey, and its completeness map. */
export function TargetPanel(props: TargetPanelProps) {
  const { collaboration, survey, targets, companions, target, population, source, onChanged } =
    props;
  const { data: stored, error } = useMap(collaboration, target.mapId);
  const curves = useMemo(
    () =>
      targets.flatMap((one) => {
        const curve = one.curves.at(-1);
        return curve
          ? [
              {
                name: one.name,
                separationArcsec: Float64Array.from(curve.separationArcsec),
                contrastMag: Float64Array.from(curve.contrastMag),
              },
            ]
          : [];
      }),
    [targets],
  );
  const map = useMemo(
    () =>
      stored && {
        massMjup: Float64Array.from(stored.massMjup),
        semiMajorAxisAu: Float64Array.from(stored.semiMajorAxisAu),
        completeness: Float64Array.from(stored.completeness.flat()),
      },
    [stored],
  );
  const own = companions.flatMap((companion) =>
    companion.targetId === target.id &&
    companion.massMjup !== null &&
    companion.semiMajorAxisAu !== null
      ? [
          {
            name:
              companion.status === 'confirmed'
                ? companion.name
                : `${companion.name}, ${companion.status}`,
            massMjup: companion.massMjup,
            massErrorMjup: companion.massErrorUpperMjup ?? undefined,
            semiMajorAxisAu: companion.semiMajorAxisAu,
            semiMajorAxisErrorAu: companion.semiMajorAxisErrorUpperAu ?? undefined,
          },
        ]
      : [],
  );
  const nSigma = target.curves.at(-1)?.nSigma;
  return (
    <div className="flex min-w-0 flex-col gap-8">
      <div className="bg-act-soft px-4 py-3">
        <div className="flex flex-wrap items-baseline justify-between gap-x-4">
          <h2 className="text-[17px]">{target.name}</h2>
          {target.probability !== null && (
            <span className="text-[14px]">
              detection probability <b>{Math.round(100 * target.probability)} %</b>
            </span>
          )}
        </div>
        <p className="text-[14px] text-ink2">{factsOf(target)}</p>
        {target.leftOutReason !== null && (
          <p className="mt-1 text-[14px] text-warn">Left out: {target.leftOutReason}</p>
        )}
        {survey.can.change && (
          <div className="mt-1">
            <LeaveOut collaboration={collaboration} target={target} onChanged={onChanged} />
            <ChosenForCompanion
              collaboration={collaboration}
              target={target}
              onChanged={onChanged}
            />
          </div>
        )}
        {!survey.can.change && target.selectedForCompanion && (
          <p className="mt-1 text-[14px] text-warn">
            Chosen because a companion was known: left out of runs unless their sample keeps it.
          </p>
        )}
      </div>
      {curves.length > 0 && (
        <section>
          <SectionOpener
            title="Contrast curves"
            help="contrast-curve"
            context={`${curves.length} targets`}
            tools={nSigma && `${nSigma} σ`}
            level={3}
          />
          <ContrastChart
            curves={curves}
            selected={target.curves.length > 0 ? target.name : undefined}
            nSigma={nSigma}
          />
        </section>
      )}
      <section>
        <SectionOpener
          title="Completeness map"
          help="completeness"
          context={stored?.origin === 'uploaded' ? 'as uploaded' : 'this star'}
          level={3}
        />
        {map ? (
          <>
            <CompletenessMapChart
              map={map}
              subject={`detection probability of ${target.name}`}
              detections={own}
              range={population ?? undefined}
            />
            <RampKey label="detection probability" />
            <MassLimitChart map={map} subject={target.name} />
            {population && target.probability !== null && (
              <p className="mt-1 text-ink3 text-note">
                Its mean over <MassRange definition={population} /> at{' '}
                <AxisRange definition={population} /> with <PowerLaws definition={population} />,{' '}
                {source}, is {Math.round(100 * target.probability)} %.
              </p>
            )}
          </>
        ) : (
          <p className="py-3 text-ink3">
            {error
              ? sentenceOf(error)
              : target.mapState === 'ready'
                ? 'The map is on its way to this page.'
                : (target.mapFault ??
                  'There is no map of this star yet: it needs a contrast curve, a distance, an age and its magnitude in the band, or a ready map.')}
          </p>
        )}
      </section>
    </div>
  );
}
