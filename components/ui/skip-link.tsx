export function SkipLink({
  href = '#main',
  children = 'Skip to the content',
}: {
  href?: string;
  children?: string;
}) {
  return (
    <a
      href={href}
      className="sr-only rounded bg-act text-note text-page focus:not-sr-only focus:absolute focus:top-2 focus:left-2 focus:z-50 focus:px-4 focus:py-2"
    >
      {children}
    </a>
  );
}
