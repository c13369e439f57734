import { type ReactNode, useId } from 'react';
import styles from './form.module.css';

export interface FieldText {
  readonly label: string;
  readonly hint?: ReactNode;
  /** Says "optional" beside the label. */
  readonly optional?: boolean;
}

interface Ids {
  readonly id: string;
  readonly 'aria-describedby': string | undefined;
  readonly 'aria-invalid': boolean | undefined;
}

interface FieldProps extends FieldText {
  readonly error: string | undefined;
  readonly children: (ids: Ids) => ReactNode;
}

/** Label, hint, control and error, tied together for a screen reader. */
export function Field({ label, hint, optional = false, error, children }: FieldProps) {
  const id = useId();
  const described = [hint && `${id}-hint`, error && `${id}-error`].filter(Boolean).join(' ');
  return (
    <div className={styles.field}>
      <label htmlFor={id} className={styles.label}>
        {label}
        {optional && <span className={styles.optional}> · optional</span>}
      </label>
      {hint && (
        <span id={`${id}-hint`} className={styles.hint}>
          {hint}
        </span>
      )}
      {children({
        id,
        'aria-describedby': described === '' ? undefined : described,
        'aria-invalid': error ? true : undefined,
      })}
      {error && (
        <span id={`${id}-error`} className={styles.error}>
          {error}
        </span>
      )}
    </div>
  );
}
