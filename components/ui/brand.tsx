export function Mark({ size = 30 }: { size?: number }) {
  return (
    <svg
      className="shrink-0"
      width={size}
      height={size}
      viewBox="0 0 32 32"
      fill="none"
      aria-hidden="true"
    >
      <path d="M3 27V5c0 0 1.2 12.6 13.5 17.2V27Z" fill="var(--data)" />
      <rect x="18.6" y="3" width="3.2" height="26" fill="var(--bound)" />
      <circle cx="27" cy="24.6" r="2.6" fill="var(--ink)" />
    </svg>
  );
}

/** The name with its bound; `size` is the height of the letters' line in px. */
export function Wordmark({ size = 22 }: { size?: number }) {
  return (
    <span
      className="inline-flex items-center font-semibold text-ink tracking-[-0.012em]"
      style={{ fontSize: size, lineHeight: 1 }}
    >
      <span className="sr-only">Rarebound</span>
      <span aria-hidden="true">Rare</span>
      <span
        aria-hidden="true"
        className="bg-bound"
        style={{
          width: (2.5 * size) / 22,
          height: (23 * size) / 22,
          margin: `0 ${(2.5 * size) / 22}px`,
          transform: 'translateY(1px)',
        }}
      />
      <span aria-hidden="true">bound</span>
    </span>
  );
}
