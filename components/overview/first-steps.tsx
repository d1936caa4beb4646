import { Link } from '@/components/ui/link';
import { SectionOpener } from '@/components/ui/section-opener';
import { StateMark } from '@/components/ui/state-mark';
import type { FirstStep } from '@/lib/schemas/first-steps';
import { EnterDemonstration } from './enter-demonstration';

const files = [
  { kind: 'targets', label: 'targets' },
  { kind: 'contrast-curves', label: 'contrast curves' },
  { kind: 'completeness-maps', label: 'completeness maps' },
  { kind: 'companions', label: 'companions' },
  { kind: 'cooling-tables', label: 'cooling table' },
  { kind: 'systems', label: 'systems' },
];

/** The first three steps of the reader's role; each is ticked by what exists. */
export function FirstSteps({
  collaboration,
  steps,
}: {
  collaboration: string;
  steps: FirstStep[];
}) {
  const next = steps.findIndex(({ isDone }) => !isDone);
  return (
    <section>
      <SectionOpener
        title="First steps"
        context={`${steps.filter(({ isDone }) => isDone).length} of ${steps.length} done`}
      />
      <ol>
        {steps.map((step, at) => (
          <li
            key={step.title}
            className="grid grid-cols-[1.5rem_1fr_auto] gap-x-3 border-rule border-b py-2.5"
          >
            <span className="text-ink3">{at + 1}</span>
            <span className="min-w-0">
              <Link
                href={`/${collaboration}${step.path}`}
                className={at === next ? 'font-semibold' : ''}
              >
                {step.title}
              </Link>
              <span className="block max-w-[60ch] text-ink3 text-note">{step.detail}</span>
            </span>
            {step.isDone ? (
              <StateMark kind="ok">done</StateMark>
            ) : (
              <StateMark kind="waiting">open</StateMark>
            )}
          </li>
        ))}
      </ol>
    </section>
  );
}

/** Small files of invented data, and a collaboration full of it. */
export function ExampleFiles({ hasDemonstration }: { hasDemonstration: boolean }) {
  return (
    <section>
      <SectionOpener title="To try with" context="invented data" />
      <p className="max-w-[60ch] text-ink2">
        One small file of each kind. Their stars fit each other: bring the targets first.
      </p>
      <ul className="mt-2 flex flex-wrap gap-x-5">
        {files.map(({ kind, label }) => (
          <li key={kind}>
            <a href={`/api/v1/examples/${kind}`} download className="inline-block py-1.5">
              {label}
            </a>
          </li>
        ))}
      </ul>
      {hasDemonstration && <EnterDemonstration />}
    </section>
  );
}
