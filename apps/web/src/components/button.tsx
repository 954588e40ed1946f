import type { ButtonHTMLAttributes, ReactNode } from 'react';
import { Link, type LinkProps } from 'react-router-dom';

const base =
  'inline-flex min-h-[38px] items-center justify-center rounded-button border px-5 py-1.5 font-semibold text-base max-margin:min-h-11';
const looks = {
  /** The one main action of a page. */
  main: 'border-amberm bg-amber text-onamber hover:bg-amberm/85 night:hover:bg-amber/85',
  plain: 'border-rule text-ink hover:border-ink',
};
type Look = keyof typeof looks;
const off = 'disabled:cursor-not-allowed disabled:border-hair disabled:bg-field disabled:text-ink3';

export function Button({
  look = 'plain',
  busy = false,
  className = '',
  children,
  ...rest
}: ButtonHTMLAttributes<HTMLButtonElement> & { look?: Look; busy?: boolean; children: ReactNode }) {
  return (
    <button
      type="button"
      {...rest}
      aria-busy={busy || undefined}
      disabled={rest.disabled || busy}
      className={`${base} ${looks[look]} ${off} ${className}`}
    >
      {children}
    </button>
  );
}

export function ButtonLink({
  look = 'plain',
  className = '',
  ...rest
}: LinkProps & { look?: Look; className?: string }) {
  return <Link {...rest} className={`${base} ${looks[look]} ${className}`} />;
}

/** A small action in words inside a line of text or a table. */
export function TextButton({
  className = '',
  children,
  ...rest
}: ButtonHTMLAttributes<HTMLButtonElement> & { children: ReactNode }) {
  return (
    <button
      type="button"
      {...rest}
      className={`link inline-flex min-h-6 cursor-pointer items-center text-left disabled:cursor-not-allowed disabled:text-ink3 ${className}`}
    >
      {children}
    </button>
  );
}
