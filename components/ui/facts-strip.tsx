import type { ReactNode } from 'react';
import { HelpMark } from '@/components/help/help-mark';
import type { HelpWord } from '@/lib/help';

export interface Fact {
  /** A key; the name in plain words. */
  name: string;
  value: ReactNode;
  /** Small, behind the value: "of 287", "(95 %)". */
  note?: ReactNode;
  /** Under the value in place of `name`, where it holds italics. */
  label?: ReactNode;
  /** A limit: set in the colour of the bound. */
  isBound?: boolean;
  /** The word that a mark behind the name explains. */
  help?: HelpWord;
}

/** Large figures with their names below; they wrap on a narrow screen. */
export function FactsStrip({ facts }: { facts: Fact[] }) {
  return (
    <div className="mb-3.5 overflow-x-clip border-rule2 border-t border-b border-b-rule py-[11px]">
      {/* The divider and indent of each line's first fact lie outside, whichever fact it is. */}
      <dl className="grid grid-cols-2 gap-y-3 md:-ml-[27px] md:flex md:flex-wrap">
        {facts.map((fact) => (
          <div
            key={fact.name}
            className="flex flex-col-reverse justify-end border-rule md:border-l md:px-[26px]"
          >
            <dt className="text-ink3 text-note">
              {fact.label ?? fact.name}
              {fact.help !== undefined && <HelpMark word={fact.help} />}
            </dt>
            <dd className={`font-semibold text-figure ${fact.isBound ? 'text-bound' : ''}`}>
              {fact.value}
              {fact.note !== undefined && (
                <small className="ml-1.5 font-normal text-ink3 text-note">{fact.note}</small>
              )}
            </dd>
          </div>
        ))}
      </dl>
    </div>
  );
}
