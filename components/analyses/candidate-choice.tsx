'use client';

import { ConsequenceSwitch } from '@/components/ui/consequence-switch';
import { Notice } from '@/components/ui/notice';
import { type Likelihood, MOST_CANDIDATES } from '@/lib/inference';
import type { AnalysisRecipe } from '@/lib/schemas/analyses';
import { listNames } from './name-words';
import { NumberEntry } from './number-entry';
import { incomplete, type OpenTally, tallyWords } from './open-candidates';

type Candidates = AnalysisRecipe['candidates'];

interface CandidateChoiceProps {
  chosen: Candidates;
  likelihood: Likelihood;
  /** Undefined until the companions of the chosen surveys are there. */
  tally: OpenTally | undefined;
  /** Why they will not come. */
  fault?: string;
  onChange(candidates: Candidates): void;
}

/** What is done with candidates that were never followed up. */
export function CandidateChoice(props: CandidateChoiceProps) {
  const { chosen, likelihood, tally, fault, onChange } = props;
  const largest = likelihood === 'host-fraction' ? 0.999 : 1000;
  const referenceRate = chosen?.treatment === 'rate-dependent' ? chosen.referenceRate : 0.1;
  return (
    <div className="mt-4 grid gap-2">
      <ConsequenceSwitch
        label="Candidates without an answer"
        value={chosen?.treatment ?? 'none'}
        onChange={(treatment) => {
          if (treatment === 'none') onChange(undefined);
          else if (treatment === 'fixed') onChange({ treatment });
          else onChange({ treatment, referenceRate });
        }}
        options={[
          { value: 'none', label: 'set aside' },
          { value: 'fixed', label: 'counted with their probability' },
          { value: 'rate-dependent', label: 'probability follows the rate' },
        ]}
      />
      {chosen?.treatment === 'rate-dependent' && (
        <div className="max-w-[13rem]">
          <NumberEntry
            label="Rate they were quoted for"
            hint={likelihood === 'host-fraction' ? 'A fraction of stars.' : 'Planets per star.'}
            value={referenceRate}
            isAllowed={(rate) => rate > 0 && rate <= largest}
            expected={`Above 0, at most ${largest}.`}
            onValue={(rate) => onChange({ treatment: 'rate-dependent', referenceRate: rate })}
          />
        </div>
      )}
      <p className="text-ink3 text-note" aria-live="polite">
        {fault !== undefined
          ? `The candidates could not be fetched: ${fault}`
          : tally === undefined
            ? 'Looking for candidates in the chosen surveys.'
            : tallyWords(tally)}
      </p>
      {chosen !== undefined && tally && <Refusals {...{ chosen, likelihood, tally }} />}
    </div>
  );
}

/** What would stop the run, said before it is started. */
function Refusals({
  chosen,
  likelihood,
  tally,
}: {
  chosen: NonNullable<Candidates>;
  likelihood: Likelihood;
  tally: OpenTally;
}) {
  const names = incomplete(tally);
  const open = new Set(
    tally.inside
      .filter(({ probability }) => probability !== null && probability > 0 && probability < 1)
      .map(({ target }) => target),
  ).size;
  if (names.length > 0) {
    return (
      <Notice tone="warn" title="A run would be refused.">
        Without mass, semi-major axis or probability: {listNames(names)}. Give what is missing,
        settle the candidate, or set candidates aside.
      </Notice>
    );
  }
  if (likelihood === 'host-fraction' && chosen.treatment === 'fixed' && open > MOST_CANDIDATES) {
    return (
      <Notice tone="warn" title="A run would be refused.">
        A fraction of stars weighs at most {MOST_CANDIDATES} candidates, and {open} stars have one:
        settle some, or ask for planets per star.
      </Notice>
    );
  }
  return null;
}
