import { useId, type ComponentProps, type ReactNode } from 'react';

/** primary: the one act of a page · secondary: any other act · danger: halt, stop · quiet: a small act within a line */
export type ButtonVariant = 'primary' | 'secondary' | 'danger' | 'quiet';

const base =
  'inline-flex items-center justify-center gap-2 rounded-sm border-[1.5px] text-center font-semibold disabled:cursor-not-allowed disabled:border-line disabled:bg-transparent disabled:text-ink-soft aria-busy:cursor-progress print:hidden';
const size = { regular: 'min-h-11 px-5 py-2', small: 'min-h-7 px-3 py-1' };
const look: Record<ButtonVariant, string> = {
  primary: 'border-water bg-water text-paper hover:border-water-deep hover:bg-water-deep',
  secondary: 'border-water text-water hover:bg-water-wash hover:text-water-deep',
  danger: 'border-brick text-brick hover:bg-brick-wash',
  quiet: 'border-transparent text-water underline underline-offset-3 hover:text-water-deep',
};

/** The classes of a button, for an element that must look like one (a `summary`, a download link). */
export function buttonClass(variant: ButtonVariant = 'secondary', small = false): string {
  return `${base} ${small ? size.small : size.regular} ${look[variant]}`;
}

interface ButtonProps extends ComponentProps<'button'> {
  variant?: ButtonVariant;
  small?: boolean;
  /** The act is under way: the button keeps its place, says so, and takes no second click. */
  pending?: boolean;
  /** What it says while pending, such as "Signing…". */
  pendingLabel?: string;
  /** Why the act is not to be had now; the button is disabled and the sentence stands below it. */
  disabledReason?: ReactNode;
}

/** A button worded as the act it does. */
export function Button({
  variant = 'secondary',
  small = false,
  pending = false,
  pendingLabel,
  disabledReason,
  className = '',
  type = 'button',
  disabled,
  children,
  ...rest
}: ButtonProps) {
  const reasonId = useId();
  const button = (
    <button
      {...rest}
      type={type}
      disabled={disabled || pending || Boolean(disabledReason)}
      aria-busy={pending || undefined}
      aria-describedby={disabledReason ? reasonId : rest['aria-describedby']}
      className={`${buttonClass(variant, small)} ${className}`}
    >
      {pending ? (pendingLabel ?? children) : children}
    </button>
  );
  if (!disabledReason) return button;
  return (
    <span className="inline-flex max-w-prose flex-col items-start gap-1">
      {button}
      <span id={reasonId} className="text-sm text-ink-soft">
        {disabledReason}
      </span>
    </span>
  );
}
