import type { ComponentProps, ReactNode, Ref } from 'react';
import { Link, type LinkProps } from 'react-router-dom';
import styles from './button.module.css';

interface Look {
  /** lamp: the one that moves the job on; strong: the one of a form; quiet: beside them; bare: in rows. */
  readonly kind?: 'lamp' | 'strong' | 'quiet' | 'bare';
  readonly size?: 'normal' | 'large';
  readonly wide?: boolean;
  /** A square with a single icon; needs an aria-label. */
  readonly icon?: boolean;
}

const look = ({ kind = 'quiet', size = 'normal', wide = false, icon = false }: Look) => ({
  'data-kind': kind,
  'data-size': size,
  'data-wide': wide ? '' : undefined,
  'data-icon': icon ? '' : undefined,
});

type ButtonProps = Look &
  Omit<ComponentProps<'button'>, 'className'> & {
    /** Work is under way: shows it, says so, and takes no second press. */
    readonly busy?: boolean;
    readonly ref?: Ref<HTMLButtonElement>;
    readonly children: ReactNode;
  };

export function Button({
  kind,
  size,
  wide,
  icon,
  busy = false,
  type = 'button',
  onClick,
  children,
  ...rest
}: ButtonProps) {
  return (
    <button
      {...rest}
      type={type}
      className={styles.button}
      {...look({ kind, size, wide, icon })}
      // Not `disabled` while busy: that would throw the focus away.
      aria-disabled={busy || undefined}
      aria-busy={busy || undefined}
      onClick={(event) => {
        if (busy) event.preventDefault();
        else onClick?.(event);
      }}
    >
      {busy && <span className={styles.spinner} aria-hidden="true" />}
      {children}
    </button>
  );
}

export function LinkButton({ kind, size, wide, icon, ...rest }: Look & Omit<LinkProps, 'className'>) {
  return <Link {...rest} className={styles.button} {...look({ kind, size, wide, icon })} />;
}
