'use client';

import { useState } from 'react';
import { FigureFrame } from '@/components/figures/figure-frame';
import { sentenceOf } from '@/components/hooks/api-problem';
import { removeObservation, useCandidate } from '@/components/hooks/use-candidates';
import { Button } from '@/components/ui/button';
import { type Fact, FactsStrip } from '@/components/ui/facts-strip';
import { Link } from '@/components/ui/link';
import { JupiterMass } from '@/components/ui/notation';
import { Notice } from '@/components/ui/notice';
import { PageTitle } from '@/components/ui/page-title';
import { SectionOpener } from '@/components/ui/section-opener';
import { StateMark } from '@/components/ui/state-mark';
import { formatPlain, THIN_SPACE } from '@/lib/quantities/display';
import type { CandidateDetail } from '@/lib/schemas/candidates';
import { EpochDialog } from './epoch-dialog';
import { EpochTable } from './epoch-table';
import { Estimates } from './estimates';
import { MotionSection } from './motion-section';
import { originWords, statusMarks, statusWords } from './status-words';
import { trackFigures } from './track-figure';
import { VerdictForm } from './verdict-form';
import { standingVerdict, VerdictHistory, withErrors } from './verdict-history';

function rangesFact({ isInsideRanges }: CandidateDetail): string {
  if (isInsideRanges === null) return 'not known';
  return isInsideRanges ? 'inside' : 'outside';
}

/** "mass, as the file states it". */
const withOrigin = (name: string, value: number | null, from: string | null | undefined) =>
  value === null || !from ? name : `${name}, ${originWords(from)}`;

function factsOf(candidate: CandidateDetail): Fact[] {
  const { massMjup, massErrorsMjup, semiMajorAxisAu, semiMajorAxisErrorsAu } = candidate;
  const verdict = standingVerdict(candidate.history);
  return [
    {
      name: 'mass',
      label: withOrigin('mass', massMjup, verdict?.massFrom),
      value:
        massMjup === null ? (
          '–'
        ) : (
          <>
            {withErrors(massMjup, massErrorsMjup, '')}
            {THIN_SPACE}
            <JupiterMass />
          </>
        ),
    },
    {
      name: 'semi-major axis',
      label: withOrigin('semi-major axis', semiMajorAxisAu, verdict?.semiMajorAxisFrom),
      help: 'companion',
      value:
        semiMajorAxisAu === null ? '–' : withErrors(semiMajorAxisAu, semiMajorAxisErrorsAu, 'AU'),
    },
    {
      name: 'probability of being bound',
      help: 'undecided-candidates',
      value: candidate.probability === null ? '–' : formatPlain(candidate.probability),
    },
    { name: 'ranges of the lead analysis', value: rangesFact(candidate) },
    { name: 'epochs', value: candidate.seen.length },
  ];
}

/** Whose age and distance the estimates and the track rest on. */
function HostValues({
  collaboration,
  candidate,
}: {
  collaboration: string;
  candidate: CandidateDetail;
}) {
  const { adopted = [], starId } = candidate.target;
  return (
    <p className="mt-2 text-ink3 text-note">
      {adopted.length > 0
        ? `Estimates and track use the adopted ${adopted.join('; ')}. `
        : `Estimates and track use age and distance as ${candidate.survey.name} lists them. `}
      {starId !== undefined && <Link href={`/${collaboration}/stars/${starId}`}>The star</Link>}
    </p>
  );
}

/** One candidate: what was seen, what it says, and what people decided. */
export function CandidateScreen({
  collaboration,
  initial,
}: {
  collaboration: string;
  initial: CandidateDetail;
}) {
  const { data: candidate = initial, mutate } = useCandidate(collaboration, initial);
  const [isAdding, setAdding] = useState(false);
  const [refusal, setRefusal] = useState<string | null>(null);
  const take = (next: CandidateDetail) => void mutate(next, { revalidate: false });
  const remove = async (id: string) => {
    setRefusal(null);
    try {
      await removeObservation(collaboration, candidate.id, id);
      await mutate();
    } catch (reason) {
      setRefusal(sentenceOf(reason));
    }
  };
  const { survey, proposals } = candidate;
  return (
    <>
      <PageTitle
        title={`${candidate.star} ${candidate.name}`}
        crumbs={[
          { href: `/${collaboration}/candidates`, label: 'Candidates' },
          { href: `/${collaboration}/surveys/${survey.slug}`, label: survey.name },
          { label: candidate.star },
        ]}
        state={
          <StateMark kind={statusMarks[candidate.status]}>
            {statusWords[candidate.status]}
          </StateMark>
        }
        actions={
          candidate.can.vet && (
            <Button icon="add" onClick={() => setAdding(true)}>
              Add an epoch
            </Button>
          )
        }
      />
      {refusal !== null && <Notice tone="bad" title={refusal} isAnnounced />}
      {proposals > 0 && (
        <div className="mb-3">
          <Notice
            tone="warn"
            title={proposals === 1 ? '1 proposal waits.' : `${proposals} proposals wait.`}
          >
            {proposals === 1
              ? 'The history below holds it; a verdict answers it.'
              : 'The history below holds them; a verdict answers them.'}
          </Notice>
        </div>
      )}
      <FactsStrip facts={factsOf(candidate)} />
      <EpochDialog
        collaboration={collaboration}
        candidate={candidate}
        isOpen={isAdding}
        onClose={() => setAdding(false)}
        onSaved={take}
      />
      <div className="mt-7 grid grid-cols-1 gap-x-14 gap-y-9 xl:grid-cols-[minmax(0,7fr)_minmax(0,4fr)]">
        <div className="flex min-w-0 flex-col gap-9">
          <section>
            <SectionOpener number={1} title="Bound or behind" help="background" />
            <FigureFrame collaboration={collaboration} {...trackFigures(candidate)}>
              <MotionSection candidate={candidate} />
            </FigureFrame>
          </section>
          <section>
            <SectionOpener number={2} title="Epochs" context="errors of 1 σ" />
            <EpochTable candidate={candidate} onRemove={(id) => void remove(id)} />
          </section>
        </div>
        <div className="flex min-w-0 flex-col gap-9">
          <section>
            <SectionOpener
              number={3}
              title="Mass and axis"
              context="estimated here, if it is bound"
            />
            <Estimates candidate={candidate} />
            <HostValues collaboration={collaboration} candidate={candidate} />
          </section>
          <section>
            <SectionOpener number={4} title="Verdict" />
            <VerdictForm
              key={candidate.history.length}
              collaboration={collaboration}
              candidate={candidate}
              onGiven={take}
            />
          </section>
          <section>
            <SectionOpener number={5} title="History" context="UTC" />
            <VerdictHistory history={candidate.history} />
          </section>
        </div>
      </div>
    </>
  );
}
