import type { ReactNode } from 'react';
import { formatDay } from '@/components/runs/time-words';
import { Link } from '@/components/ui/link';
import { SectionOpener } from '@/components/ui/section-opener';
import type { ReleasePage } from '@/lib/schemas/release-page';
import { shortDigest } from './release-words';

interface Step {
  key: string;
  at: string;
  what: ReactNode;
}

function stepsOf(page: ReleasePage): Step[] {
  const frozen = page.runs.map(({ id, name, frozenAt, frozenBy, reason }) => ({
    key: `frozen-${id}`,
    at: frozenAt,
    what: (
      <>
        {name} frozen by {frozenBy}
        {reason !== null && (
          <span className="block text-ink3">Although a check was not met: {reason}</span>
        )}
      </>
    ),
  }));
  const steps: Step[] = [...frozen];
  if (page.signedOff) {
    steps.push({
      key: 'signed',
      at: page.signedOff.at,
      what: `signed off by ${page.signedOff.by}, statistician`,
    });
  }
  if (page.agreed) {
    steps.push({ key: 'agreed', at: page.agreed.at, what: `agreed by ${page.agreed.by}` });
  }
  if (page.verification) {
    const { checkedAt, isSame, digits, runs } = page.verification;
    const toTheBit = runs.every(({ isSameDigest }) => isSameDigest);
    steps.push({
      key: 'checked',
      at: checkedAt,
      what: isSame
        ? `run again from its inputs: every number the same to ${digits} digits${toTheBit ? ', and to the last bit' : ''}`
        : 'run again from its inputs: other numbers',
    });
  }
  if (page.published) {
    steps.push({
      key: 'published',
      at: page.published.at,
      what: `published by ${page.published.by}`,
    });
  }
  return steps;
}

/** Who froze, signed and agreed, what running again gave, and the fingerprints to check it by. */
export function ReleaseSeal({ page }: { page: ReleasePage }) {
  return (
    <section>
      <SectionOpener title={page.kind === 'run' ? 'Frozen' : 'Seal'} />
      <ol className="ml-1.5 grid gap-3 border-ink2 border-l-[1.5px] text-note">
        {stepsOf(page).map(({ key, at, what }) => (
          <li
            key={key}
            className='relative pl-4 before:absolute before:top-1 before:-left-[6px] before:size-[10px] before:rotate-45 before:border-[1.5px] before:border-ink2 before:bg-page before:content-[""]'
          >
            <b className="block">{formatDay(at)}</b>
            <span className="text-ink2">{what}</span>
          </li>
        ))}
      </ol>
      <dl className="mt-4 grid gap-3 text-note">
        {page.runs.map((run) => (
          <div key={run.id}>
            <dt className="text-ink3">Fingerprints of {run.name} (SHA-256)</dt>
            {(
              [
                ['inputs', run.inputsDigest],
                ['result', run.resultDigest],
                ['kept inputs', run.snapshotSha256],
              ] as const
            ).map(([name, digest]) => (
              <dd key={name} className="break-all">
                {name}{' '}
                <span title={digest} className="text-ink2">
                  {shortDigest(digest)}
                </span>
              </dd>
            ))}
          </div>
        ))}
      </dl>
      {(page.replaces || page.replacedBy) && (
        <p className="mt-3 text-note">
          {page.replaces && (
            <>
              Replaces <Link href={`/r/${page.replaces.code}`}>{page.replaces.key}</Link>.{' '}
            </>
          )}
          {page.replacedBy && (
            <>
              Replaced by <Link href={`/r/${page.replacedBy.code}`}>{page.replacedBy.key}</Link>.
            </>
          )}
        </p>
      )}
    </section>
  );
}
