import type { ButtonHTMLAttributes, ReactNode } from 'react';
import { Link, type LinkProps } from 'react-router-dom';
import { classNames } from './class-names.ts';

/** `main`: the one main button of a screen. `text`: as a link among words. */
export type ButtonLook = 'main' | 'plain' | 'quiet' | 'text' | 'wrong';

const LOOKS: Record<ButtonLook, string> = {
  main: 'border border-ink bg-ink text-white font-semibold px-3 py-[5px] hover:bg-[#2b3947]',
  plain: 'border border-ink bg-film px-3 py-[5px] hover:bg-hover',
  quiet: 'border border-edge bg-film px-3 py-[5px] hover:bg-hover',
  wrong: 'border border-wrong bg-film text-wrong px-3 py-[5px] hover:bg-hover',
  text: 'underline underline-offset-2 decoration-rule hover:decoration-ink px-0 py-0',
};

export function buttonClass(look: ButtonLook, extra?: string): string {
  return classNames(
    'inline-flex items-center justify-center gap-2 rounded-sheet text-base leading-[1.4] no-underline',
    'disabled:opacity-55 touch',
    LOOKS[look],
    look === 'text' && 'underline',
    extra,
  );
}

interface ButtonProps extends ButtonHTMLAttributes<HTMLButtonElement> {
  look?: ButtonLook;
  /** Shown in place of the label and to the screen reader while the action runs; the button waits. */
  busyLabel?: string | undefined;
  busy?: boolean;
  children: ReactNode;
}

/** A button whose label is a verb. While `busy` it keeps its focus and takes no second press. */
export function Button({
  look = 'plain',
  busy = false,
  busyLabel,
  onClick,
  children,
  className,
  type,
  ...rest
}: ButtonProps) {
  return (
    <button
      type={type ?? 'button'}
      className={buttonClass(look, className)}
      aria-disabled={busy || undefined}
      onClick={busy ? (event) => event.preventDefault() : onClick}
      {...rest}
    >
      {busy && busyLabel ? busyLabel : children}
    </button>
  );
}

export function ButtonLink({
  look = 'plain',
  className,
  ...rest
}: LinkProps & { look?: ButtonLook; className?: string }) {
  return <Link className={buttonClass(look, className)} {...rest} />;
}
