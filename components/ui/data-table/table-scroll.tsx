import type { ReactNode, Ref } from 'react';

interface TableScrollProps {
  caption: string;
  /** Many rows: the table scrolls in itself, under a head that stays. */
  isVirtual: boolean;
  scroller: Ref<HTMLDivElement>;
  rowCount: number | undefined;
  children: ReactNode;
}

/** The frame in which a table scrolls, sideways on narrow screens, never the page. */
export function TableScroll({
  caption,
  isVirtual,
  scroller,
  rowCount,
  children,
}: TableScrollProps) {
  const tall = isVirtual
    ? 'max-h-[max(420px,74dvh)] overflow-y-auto [&_thead_th]:sticky [&_thead_th]:top-0 [&_thead_th]:z-10 [&_thead_th]:bg-page'
    : '';
  return (
    <div
      ref={scroller}
      // biome-ignore lint/a11y/noNoninteractiveTabindex: a region that scrolls must be reachable by keyboard
      tabIndex={0}
      className={`scrolls-sideways relative min-w-0 focus-visible:outline-offset-0 ${tall}`}
    >
      <table className="w-full border-collapse text-note" aria-rowcount={rowCount}>
        <caption className="sr-only">{caption}</caption>
        {children}
      </table>
    </div>
  );
}
