import clsx from 'clsx';

export type ButtonVariant = 'primary' | 'quiet' | 'plain' | 'danger';
export type ButtonSize = 'small' | 'normal' | 'roomy';

const variants: Record<ButtonVariant, string> = {
  primary:
    'border-verdigris bg-verdigris text-on-verdigris hover:border-verdigris-deep hover:bg-verdigris-deep data-pressed:bg-verdigris-deep',
  quiet: 'border-edge bg-sheet text-ink hover:border-ink data-pressed:bg-sunk',
  plain:
    'border-transparent bg-transparent text-verdigris hover:bg-verdigris-wash data-pressed:bg-verdigris-wash',
  danger:
    'border-madder bg-sheet text-madder hover:bg-madder hover:text-on-madder data-pressed:bg-madder-deep',
};

const sizes: Record<ButtonSize, string> = {
  small: 'min-h-7 px-2.5 py-0.5 text-sm pointer-coarse:min-h-9',
  normal: 'min-h-9 px-3.5 py-1.5 text-base pointer-coarse:min-h-11',
  roomy: 'min-h-12 px-5 py-2.5 text-md',
};

/** Classes of a button, for `<Button>` and for links that look like one. */
export function buttonClass(
  variant: ButtonVariant = 'quiet',
  size: ButtonSize = 'normal',
  extra?: string,
): string {
  return clsx(
    'inline-flex items-center justify-center gap-2 border text-center font-semibold no-underline select-none',
    'transition-colors duration-100',
    'data-disabled:border-rule data-disabled:bg-sunk data-disabled:text-slate data-pending:cursor-progress',
    variants[variant],
    sizes[size],
    extra,
  );
}
