import type { ReactNode } from 'react';
import { HelpMark } from '@/components/help/help-mark';
import type { HelpWord } from '@/lib/help';
import { LogTicks } from './log-ticks';

export interface SectionOpenerProps {
  /** Its place in the order of reading; left out where a page has no numbers. */
  number?: number;
  title: ReactNode;
  /** One line beside the title. */
  context?: ReactNode;
  /** Text links or a small switch at the right end. */
  tools?: ReactNode;
  id?: string;
  level?: 2 | 3;
  /** The word that a mark behind the title explains. */
  help?: HelpWord;
}

export function SectionOpener({
  number,
  title,
  context,
  tools,
  id,
  level = 2,
  help,
}: SectionOpenerProps) {
  const Heading = level === 2 ? 'h2' : 'h3';
  return (
    <header className="relative mb-3.5 border-rule2 border-t">
      <LogTicks />
      <div className="flex flex-wrap items-baseline gap-x-3 gap-y-1 pt-[17px]">
        <div className="flex min-w-0 items-center gap-x-0.5">
          <Heading id={id} className="text-section tracking-[-0.003em]">
            {number !== undefined && (
              <span className="mr-[9px] font-normal text-ink3">{number}</span>
            )}
            {title}
          </Heading>
          {help !== undefined && <HelpMark word={help} />}
        </div>
        {context !== undefined && <p className="text-ink2 text-note">{context}</p>}
        {tools !== undefined && (
          <div className="ml-auto flex flex-wrap items-center gap-3 text-note">{tools}</div>
        )}
      </div>
    </header>
  );
}
