'use client';

import { useAction } from '@/components/hooks/use-action';
import { sendBundle, useImports } from '@/components/hooks/use-releases';
import { FileDrop } from '@/components/ui/file-drop';
import { Link } from '@/components/ui/link';
import { Notice } from '@/components/ui/notice';
import { SectionOpener } from '@/components/ui/section-opener';
import { StateMark } from '@/components/ui/state-mark';
import { useDay } from '@/components/ui/time-zone';
import type { BundleImportView } from '@/lib/schemas/bundles';

const MOST_BYTES = 256 * 2 ** 20;

function Agreement({ one }: { one: BundleImportView }) {
  if (one.status === 'failed') return <StateMark kind="bad">{one.fault ?? 'failed'}</StateMark>;
  if (one.status === 'cancelled') return <StateMark kind="stopped">stopped</StateMark>;
  if (!one.agreement) return <StateMark kind="running">maps and run on their way</StateMark>;
  const { isSameInputs, isSameResult, limit, expectedLimit } = one.agreement;
  if (isSameInputs && isSameResult) {
    return <StateMark kind="ok">same inputs and same result, to the last digit</StateMark>;
  }
  return (
    <StateMark kind="warn">
      {isSameResult
        ? 'same result from other inputs'
        : `another result: ${limit} here, ${expectedLimit} in the bundle`}
    </StateMark>
  );
}

/** Bringing a bundle in, and whether what came in gave the same again. */
export function BundlePanel({
  collaboration,
  initial,
  canBring,
}: {
  collaboration: string;
  initial: BundleImportView[];
  canBring: boolean;
}) {
  const day = useDay();
  const { data: imports = initial, mutate } = useImports(collaboration, initial);
  const { perform, isBusy, problem } = useAction();
  const bring = ([file]: File[]) =>
    perform(async () => {
      await sendBundle(collaboration, file);
      await mutate();
    });
  return (
    <section className="min-w-0">
      <SectionOpener
        title="Bring in a bundle"
        context="and compute its run again, from its inputs"
      />
      {canBring ? (
        <FileDrop
          label="Drop a bundle here"
          hint="the ZIP of a release or of a run: surveys, population and analysis are made anew"
          accept={{ 'application/zip': ['.zip'] }}
          isMultiple={false}
          maxBytes={MOST_BYTES}
          disabledReason={isBusy ? 'One is on its way.' : undefined}
          onFiles={(files) => void bring(files)}
        />
      ) : (
        <p className="text-ink3 text-note">
          Owners and collaborators bring bundles in: ask one of them.
        </p>
      )}
      {problem !== undefined && (
        <div className="mt-3">
          <Notice tone="bad" title="Nothing was brought in." isAnnounced>
            {problem}
          </Notice>
        </div>
      )}
      <ul className="mt-3 text-note">
        {imports.map((one) => (
          <li key={one.id} className="border-rule border-b py-2.5">
            <p>
              <Link href={`/${collaboration}/analyses/${one.analysisKey}`}>{one.analysisKey}</Link>{' '}
              from {one.title}
            </p>
            <p className="text-ink3">
              {one.importedBy ?? 'a former member'}, {day(one.createdAt)}
            </p>
            <Agreement one={one} />
          </li>
        ))}
      </ul>
    </section>
  );
}
