/** A share between 0 and 1 as a bar; its number stands beside it. */
export function ProbabilityBar({
  value,
  colour = 'var(--data)',
  width = 52,
  height = 8,
}: {
  value: number;
  colour?: string;
  width?: number;
  height?: number;
}) {
  const share = Math.min(1, Math.max(0, value));
  return (
    <span
      className="inline-block bg-well align-middle"
      style={{ width, height }}
      aria-hidden="true"
    >
      <span
        className="block h-full"
        style={{ width: `${100 * share}%`, backgroundColor: colour }}
      />
    </span>
  );
}
