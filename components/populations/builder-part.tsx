import type { ReactNode } from 'react';

interface BuilderPartProps {
  number: number;
  title: ReactNode;
  /** What it is now, at the right end; a choice stands in the body. */
  form?: ReactNode;
  children: ReactNode;
}

/** One part of a population, in the order in which it is described. */
export function BuilderPart({ number, title, form, children }: BuilderPartProps) {
  return (
    <section className="border-rule border-t pt-3.5 pb-3 first:border-t-0">
      <header className="mb-2 flex items-baseline gap-[9px]">
        <span className="text-ink3">{number}</span>
        <h2 className="text-[16px]">{title}</h2>
        {form !== undefined && <span className="ml-auto text-chart text-ink3">{form}</span>}
      </header>
      {children}
    </section>
  );
}
