import Link from 'next/link';
import type { ComponentProps, ReactNode } from 'react';

export type ButtonLook = 'primary' | 'secondary' | 'quiet' | 'danger';

const base =
  'inline-flex min-h-8 items-center justify-center gap-1.5 rounded px-3 py-1 text-sm font-semibold whitespace-nowrap transition-colors disabled:opacity-55 aria-disabled:opacity-55';
const looks: Record<ButtonLook, string> = {
  primary: 'bg-indigo-fill text-on-indigo enabled:hover:brightness-110',
  secondary: 'border border-indigo! text-indigo bg-surface enabled:hover:bg-indigo-wash',
  quiet: 'text-ink enabled:hover:bg-indigo-wash',
  danger: 'border border-madder! text-madder bg-surface enabled:hover:bg-madder-wash',
};

export function buttonClass(look: ButtonLook = 'secondary', className = ''): string {
  return `${base} ${looks[look]} ${className}`;
}

interface ButtonProps extends ComponentProps<'button'> {
  look?: ButtonLook;
  /** Shows that the press is being carried out, and refuses a second one. */
  busy?: boolean;
}

export function Button({
  look,
  busy = false,
  className,
  disabled,
  children,
  type = 'button',
  ...rest
}: ButtonProps) {
  return (
    <button
      type={type}
      className={buttonClass(look, className)}
      disabled={disabled || busy}
      aria-busy={busy || undefined}
      {...rest}
    >
      {busy ? <Spinner /> : null}
      {children}
    </button>
  );
}

/** A square button for one symbol; the label is what is read out and shown as a tip. */
export function IconButton({
  label,
  className = '',
  ...rest
}: Omit<ButtonProps, 'aria-label'> & { label: string }) {
  return (
    <Button
      look="quiet"
      aria-label={label}
      title={label}
      className={`min-w-8 px-1.5 ${className}`}
      {...rest}
    />
  );
}

interface ButtonLinkProps {
  href: string;
  look?: ButtonLook;
  className?: string;
  children: ReactNode;
  /** A file to save rather than a page to open. */
  download?: boolean | string;
}

export function ButtonLink({ href, look, className, children, download }: ButtonLinkProps) {
  const hover = look === 'primary' ? 'hover:brightness-110' : 'hover:bg-indigo-wash';
  const classes = buttonClass(look, `${hover} ${className ?? ''}`);
  if (download !== undefined) {
    return (
      <a href={href} className={classes} download={download}>
        {children}
      </a>
    );
  }
  return (
    <Link href={href} className={classes}>
      {children}
    </Link>
  );
}

export function Spinner() {
  return (
    <span
      aria-hidden="true"
      className="inline-block size-3 animate-spin rounded-full border-2 border-current! border-t-transparent!"
    />
  );
}
