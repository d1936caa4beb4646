'use client';

import { useRunStudies, useStudy } from '@/components/hooks/use-studies';
import { Link } from '@/components/ui/link';
import { StateMark } from '@/components/ui/state-mark';
import type { StudySummary } from '@/lib/schemas/studies';
import { questionAddress } from '../kind-words';

interface CalibrationCheckProps {
  collaboration: string;
  analysisKey: string;
  runId: string;
  /** Set while the number on the screen is of another setting than the run. */
  ofRun?: number;
}

/** The newest calibration of a run that has ended with an answer, or is on its way. */
export function newestCalibration(studies: StudySummary[]): StudySummary | undefined {
  const all = studies
    .filter(({ settings, job }) => {
      const isLost = job.status === 'failed' || job.status === 'cancelled';
      return settings.kind === 'calibration' && !isLost;
    })
    .sort((a, b) => b.number - a.number);
  return all.find(({ job }) => job.status === 'done') ?? all[0];
}

/** Whether the limits of this run hold as often as they say, in one line beside the number. */
export function CalibrationCheck(props: CalibrationCheckProps) {
  const { collaboration, analysisKey, runId, ofRun } = props;
  const { data: studies, error } = useRunStudies(collaboration, runId);
  const newest = studies && newestCalibration(studies);
  const isDone = newest?.job.status === 'done';
  const { data: study } = useStudy(collaboration, isDone ? newest.id : undefined);
  const place = questionAddress(collaboration, analysisKey, 'calibration', newest?.id);
  if (error !== undefined) {
    return <StateMark kind="warn">Whether it is calibrated could not be fetched</StateMark>;
  }
  if (!studies) return <StateMark kind="waiting">Looking for a calibration</StateMark>;
  if (!newest) {
    return (
      <StateMark kind="warn">
        Not calibrated: <Link href={place}>see whether its limits hold</Link>
      </StateMark>
    );
  }
  if (!isDone) {
    return (
      <StateMark kind="running">
        <Link href={place}>Calibration on its way</Link>
      </StateMark>
    );
  }
  const result = study?.result?.kind === 'calibration' ? study.result : undefined;
  if (!result) return <StateMark kind="waiting">Fetching its calibration</StateMark>;
  return (
    <StateMark kind={result.passes ? 'ok' : 'bad'}>
      {result.passes ? 'Calibrated: ' : 'Calibration failed: '}
      <Link href={place}>
        {checkInWords(result.coverage, result.surveys, study?.credibleLevel)}
      </Link>
      {ofRun !== undefined && `, run ${ofRun}`}
    </StateMark>
  );
}

/** "95 % limits lay above the truth in 95.1 % of 1000 invented surveys". */
export function checkInWords(
  coverage: { level: number; observed: number }[],
  surveys: number,
  runLevel: number | undefined,
): string {
  const row =
    coverage.find(({ level }) => level === runLevel) ??
    coverage.reduce((a, b) => (b.level > a.level ? b : a));
  const level = `${Number((100 * row.level).toPrecision(6))}\u2009%`;
  return `${level} limits lay above the truth in ${(100 * row.observed).toFixed(1)}\u2009% of ${surveys} invented surveys`;
}
