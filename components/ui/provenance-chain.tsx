import type { ReactNode } from 'react';
import { Icon } from './icon';
import { Link } from './link';

export interface ProvenanceStep {
  /** "Stars", "Cooling model". */
  kind: string;
  what: ReactNode;
  /** By whom and when, or which version. */
  by?: ReactNode;
  /** A short hash; the tick says that it still matches. */
  fingerprint?: string;
  href?: string;
}

const diamond =
  'before:absolute before:size-[10px] before:rotate-45 before:border-[1.5px] before:border-ink2 before:bg-page before:content-[""]';

/** A line with diamonds, a step each; it stands upright where there is no width. */
export function ProvenanceChain({ steps }: { steps: ProvenanceStep[] }) {
  return (
    <ol
      className="grid pt-1 text-note max-xl:pl-1.5 xl:grid-flow-col xl:auto-cols-fr"
      aria-label="What this was made from"
    >
      {steps.map((step) => (
        <li
          key={step.kind}
          className={`relative flex flex-col gap-px border-ink2 text-ink2 leading-[1.38] max-xl:border-l-[1.5px] max-xl:pb-3 max-xl:pl-4 max-xl:before:top-1 max-xl:before:-left-[6px] max-xl:last:pb-0 xl:border-t-[1.5px] xl:pt-[13px] xl:pr-3 xl:before:-top-[6px] xl:before:left-0 ${diamond}`}
        >
          <span className="text-ink3">{step.kind}</span>
          <b className="text-ink">
            {step.href === undefined ? step.what : <Link href={step.href}>{step.what}</Link>}
          </b>
          {step.by !== undefined && <span>{step.by}</span>}
          {step.fingerprint !== undefined && (
            <span className="flex items-center gap-1 text-chart text-ok">
              <Icon name="ok" size={13} />
              <span className="sr-only">matches fingerprint </span>
              {step.fingerprint}
            </span>
          )}
        </li>
      ))}
    </ol>
  );
}
