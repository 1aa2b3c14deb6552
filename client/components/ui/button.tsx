import type { ComponentProps, ReactNode } from 'react';
import { Link, type LinkProps } from 'react-router-dom';
import { cx } from '../../lib/cx.ts';

export type ButtonLook = 'main' | 'second' | 'danger' | 'quiet';

const base =
  'inline-flex min-h-10 items-center justify-center gap-2 rounded-box border py-2 text-center leading-snug ' +
  ' disabled:cursor-not-allowed aria-disabled:cursor-not-allowed';

const looks: Record<ButtonLook, string> = {
  main: 'border-verdigris bg-verdigris px-4 font-semibold text-sheet hover:underline underline-offset-4',
  second: 'border-verdigris px-4 font-semibold text-verdigris hover:bg-wash',
  danger: 'border-litharge bg-litharge px-4 font-semibold text-sheet hover:underline underline-offset-4',
  quiet:
    'border-transparent px-2 font-medium text-ink underline decoration-1 underline-offset-4 hover:decoration-2',
};

const resting =
  'disabled:border-line disabled:border-dashed disabled:bg-transparent disabled:text-ink-2 disabled:no-underline';

type ButtonProps = ComponentProps<'button'> & {
  look?: ButtonLook;
  /** While the act runs: the button stays in place and readable, but acts no second time. */
  busy?: boolean;
  busyText?: ReactNode;
};

export function Button({
  look = 'main',
  busy = false,
  busyText,
  className,
  children,
  onClick,
  ...rest
}: ButtonProps) {
  return (
    <button
      type="button"
      {...rest}
      aria-disabled={busy || undefined}
      onClick={busy ? (event) => event.preventDefault() : onClick}
      className={cx(base, looks[look], resting, className)}
    >
      {busy && <BusyDots />}
      {busy && busyText ? busyText : children}
    </button>
  );
}

type LinkButtonProps = LinkProps & { look?: ButtonLook };

/** Looks like a button and goes somewhere: for the next step, not for acts. */
export function LinkButton({ look = 'main', className, ...rest }: LinkButtonProps) {
  return <Link {...rest} className={cx(base, looks[look], className)} />;
}

function BusyDots() {
  return (
    <svg viewBox="0 0 18 6" className="w-4 animate-pulse" fill="currentColor" aria-hidden="true">
      <circle cx="3" cy="3" r="2" />
      <circle cx="9" cy="3" r="2" />
      <circle cx="15" cy="3" r="2" />
    </svg>
  );
}
