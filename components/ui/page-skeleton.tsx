import { LogTicks } from './log-ticks';

interface PageSkeletonProps {
  /** What is being opened: "the analysis". */
  what: string;
  /** The first thing under the title: axes without marks, the plate of a statement, or lines of a table. */
  shape: 'plate' | 'axes' | 'table';
}

function Axes({ className = '' }: { className?: string }) {
  return (
    <svg
      className={`block w-full ${className}`}
      viewBox="0 0 600 260"
      preserveAspectRatio="none"
      fill="none"
      stroke="var(--rule2)"
      aria-hidden="true"
    >
      <path vectorEffect="non-scaling-stroke" d="M40 8V228H592" />
      {[0, 1, 2, 3].map((decade) => (
        <path
          key={decade}
          vectorEffect="non-scaling-stroke"
          d={`M${40 + 184 * decade} 228v8M${95 + 184 * decade} 228v4M${128 + 184 * decade} 228v4M${169 + 184 * decade} 228v4`}
        />
      ))}
    </svg>
  );
}

function Lines() {
  return (
    <div className="border-rule2 border-t" aria-hidden="true">
      {Array.from({ length: 8 }, (_, line) => (
        <div
          // biome-ignore lint/suspicious/noArrayIndexKey: the lines never change their order
          key={line}
          className="flex h-[35px] items-center gap-8 border-rule border-b"
        >
          <span className="h-2 w-40 bg-well" />
          <span className="h-2 flex-1 bg-well" />
          <span className="h-2 w-16 bg-well" />
        </div>
      ))}
    </div>
  );
}

/** A page on its way: its frame stands at once, and as tall as the screen, so that nothing jumps. */
export function PageSkeleton({ what, shape }: PageSkeletonProps) {
  return (
    <div className="min-h-dvh" aria-busy="true">
      <div className="pt-5 pb-[18px]">
        <p className="mb-[3px] text-ink3 text-note" role="status">
          Opening {what}
        </p>
        <div className="h-[38px] w-64 max-w-full rounded bg-well" aria-hidden="true" />
      </div>
      {shape === 'plate' && (
        <div className="plate mb-9 rounded-plate px-6 py-8 md:px-9">
          <Axes className="h-[280px]" />
        </div>
      )}
      {shape === 'axes' && (
        <div className="grid gap-10 lg:grid-cols-2">
          <Axes className="h-[300px]" />
          <Axes className="h-[300px]" />
        </div>
      )}
      {shape !== 'table' && <div className="h-8" />}
      <div className="relative mb-3.5 border-rule2 border-t pt-[17px]" aria-hidden="true">
        <LogTicks />
        <div className="h-[23px] w-40 rounded bg-well" />
      </div>
      <Lines />
    </div>
  );
}
