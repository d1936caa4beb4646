import type { ReactNode } from 'react';

const drawings = {
  add: <path d="M8 3v10M3 8h10" />,
  back: <path d="M10 4L6 8l4 4" />,
  bad: (
    <>
      <path d="M5.3 2.5h5.4l2.8 2.8v5.4l-2.8 2.8H5.3l-2.8-2.8V5.3z" />
      <path d="M5.8 5.8l4.4 4.4M10.2 5.8l-4.4 4.4" />
    </>
  ),
  clock: (
    <>
      <circle cx="8" cy="8" r="5.5" />
      <path d="M8 5v3.2l2.2 1.6" />
    </>
  ),
  close: <path d="M4 4l8 8M12 4l-8 8" />,
  compare: <path d="M2.5 13V3M13.5 13V3M2.5 10c4 0 6-5 11-5" />,
  copy: <path d="M5.5 5.5h8v8h-8zM10.5 5.5v-3h-8v8h3" />,
  dark: <path d="M13 9.6A5.6 5.6 0 016.4 3 5.6 5.6 0 1013 9.6z" />,
  diamond: <path d="M8 2.5l5.5 5.5L8 13.5 2.5 8z" fill="currentColor" />,
  document: <path d="M4 2.5h5l3.5 3.5v7.5H4zM9 2.5V6h3.5" />,
  down: <path d="M4 6l4 4 4-4" />,
  download: <path d="M8 2.5v8M4.8 7.5L8 10.7l3.2-3.2M2.5 13.5h11" />,
  draft: <circle cx="8" cy="8" r="5" strokeDasharray="2.4 2.2" />,
  eye: (
    <>
      <path d="M1.5 8S4 3.8 8 3.8 14.5 8 14.5 8 12 12.2 8 12.2 1.5 8 1.5 8z" />
      <circle cx="8" cy="8" r="1.9" />
    </>
  ),
  find: (
    <>
      <circle cx="7" cy="7" r="4.5" />
      <path d="M10.5 10.5L14 14" />
    </>
  ),
  forward: <path d="M2.5 8h10M9 4.5L12.5 8 9 11.5" />,
  key: (
    <>
      <circle cx="5" cy="8" r="2.5" />
      <path d="M7.5 8h6v2.5M11 8v2" />
    </>
  ),
  light: (
    <>
      <circle cx="8" cy="8" r="3" />
      <path d="M8 1.5v2M8 12.5v2M1.5 8h2M12.5 8h2M3.4 3.4l1.4 1.4M11.2 11.2l1.4 1.4M12.6 3.4l-1.4 1.4M4.8 11.2l-1.4 1.4" />
    </>
  ),
  link: (
    <path d="M6.5 9.5l3-3M7 4.8l1.3-1.3a2.6 2.6 0 013.7 3.7L10.7 8.5M9 11.2l-1.3 1.3A2.6 2.6 0 014 8.8L5.3 7.5" />
  ),
  lock: (
    <>
      <rect x="3.5" y="7" width="9" height="6.5" />
      <path d="M5.5 7V5a2.5 2.5 0 015 0v2" />
    </>
  ),
  mail: <path d="M2.5 4h11v8.5h-11zM2.5 4.5L8 9l5.5-4.5" />,
  menu: <path d="M2 4h12M2 8h12M2 12h12" />,
  next: <path d="M6 4l4 4-4 4" />,
  ok: <path d="M3 8.5l3.2 3.2L13 5" />,
  running: <path d="M8 2.5a5.5 5.5 0 105.5 5.5" />,
  system: <path d="M2.5 3h11v7.5h-11zM5.5 13.5h5M8 10.5v3" />,
  table: <path d="M2.5 3h11v10h-11zM2.5 6.3h11M2.5 9.6h11M6.5 3v10" />,
  undo: <path d="M3 6.5h6.5a3.5 3.5 0 010 7H6M5.5 4L3 6.5 5.5 9" />,
  warn: (
    <>
      <path d="M8 2.5l6 11H2z" />
      <path d="M8 7v3M8 11.6v.4" />
    </>
  ),
} satisfies Record<string, ReactNode>;

export type IconName = keyof typeof drawings;

/** Always beside a word that says the same: the drawing itself is hidden from readers. */
export function Icon({
  name,
  size = 16,
  className = '',
}: {
  name: IconName;
  size?: number;
  className?: string;
}) {
  return (
    <svg
      className={`inline-block shrink-0 align-[-3px] ${className}`}
      width={size}
      height={size}
      viewBox="0 0 16 16"
      fill="none"
      stroke="currentColor"
      strokeWidth="1.5"
      aria-hidden="true"
    >
      {drawings[name]}
    </svg>
  );
}
