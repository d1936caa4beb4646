export type ButtonVariant = 'primary' | 'normal' | 'quiet';
export type ButtonSize = 'normal' | 'small';

const variants: Record<ButtonVariant, string> = {
  primary: 'border-act bg-act text-page',
  normal: 'border-rule2 bg-surface text-ink',
  quiet: 'border-transparent bg-transparent text-act',
};

/** The look that buttons and links-as-buttons share. */
export function buttonLook(
  variant: ButtonVariant,
  size: ButtonSize,
  isRefused: boolean,
  isWide: boolean,
): string {
  const height = size === 'small' ? 'h-[30px] text-note' : 'h-9';
  const padding = variant === 'quiet' ? 'px-2' : size === 'small' ? 'px-2.5' : 'px-3.5';
  const look = isRefused
    ? 'border-dashed border-rule2 bg-transparent text-ink3 cursor-not-allowed'
    : variants[variant];
  return `inline-flex items-center justify-center gap-[7px] rounded border font-semibold whitespace-nowrap hover:no-underline max-md:h-11 print:hidden pointer-coarse:h-11 ${height} ${padding} ${look} ${isWide ? 'w-full' : ''}`;
}
