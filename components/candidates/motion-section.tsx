import { MotionTrackChart } from '@/components/charts/motion-track-chart';
import { Notice } from '@/components/ui/notice';
import type { CandidateDetail } from '@/lib/schemas/candidates';
import { concludeMotion, fitWords, whyNoTest } from './hypothesis-words';
import { motionData } from './motion-data';

/** The track of a background source against what was seen, and both hypotheses in words. */
export function MotionSection({ candidate }: { candidate: CandidateDetail }) {
  const { hypotheses } = candidate;
  const { epochs, track } = motionData(candidate);
  const conclusion = hypotheses && concludeMotion(hypotheses);
  return (
    <>
      {conclusion ? (
        <Notice tone={conclusion.tone} title={conclusion.title}>
          {conclusion.meaning}
        </Notice>
      ) : (
        <Notice tone="neutral" title="Not tested yet.">
          {whyNoTest(candidate)}
        </Notice>
      )}
      {hypotheses && (
        <dl className="mt-3 mb-4 grid gap-x-4 gap-y-1 text-note sm:grid-cols-[max-content_1fr]">
          <dt className="text-ink3">moves with its star</dt>
          <dd>{fitWords(hypotheses.commonProperMotion)}</dd>
          <dt className="text-ink3">at rest behind it</dt>
          <dd>{fitWords(hypotheses.background)}</dd>
        </dl>
      )}
      {epochs.length > 0 && (
        <div className="mt-3">
          <MotionTrackChart
            name={`${candidate.star} ${candidate.name}`}
            epochs={epochs}
            track={track}
          />
        </div>
      )}
      <p className="mt-2 max-w-[72ch] text-ink3 text-note">
        The first epoch with errors is the reference, and its error counts at each other one. A
        hypothesis is refused where chance alone would give so large a χ² in fewer than 0.27
        {'\u00a0'}% of cases. Orbital motion is not modelled, and the proper motion counts as exact.
      </p>
    </>
  );
}
