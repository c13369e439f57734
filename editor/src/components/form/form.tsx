import type { ReactNode } from 'react';
import type { FieldPath, FieldValues } from 'react-hook-form';
import { Button } from '../button';
import { Problem } from '../states';
import styles from './form.module.css';
import { sortErrors } from './server-errors';
import type { ZodForm } from './use-zod-form';

interface FormProps<In extends FieldValues, Out> {
  readonly form: ZodForm<In, Out>;
  /** Sends the answers; what it throws is shown at the fields it names, or above the button. */
  readonly onSubmit: (values: Out) => Promise<void>;
  readonly label: string;
  readonly submitLabel: string;
  /** lamp only where the form is what moves the job on. */
  readonly submitKind?: 'lamp' | 'strong';
  /** The form's field for the server's name of it, where the two differ. */
  readonly serverName?: (name: string) => string;
  /** Beside the button. */
  readonly beside?: ReactNode;
  readonly wideButton?: boolean;
  readonly children: ReactNode;
}

export function Form<In extends FieldValues, Out>({
  form,
  onSubmit,
  label,
  submitLabel,
  submitKind = 'strong',
  beside,
  serverName,
  wideButton = false,
  children,
}: FormProps<In, Out>) {
  const { isSubmitting, errors } = form.formState;
  const submit = form.handleSubmit(async (values) => {
    try {
      await onSubmit(values);
    } catch (error) {
      const known = (name: string) => hasField(form.control._fields, name);
      const { fields, rest } = sortErrors(error, known, serverName);
      fields.forEach(({ name, message }, i) => {
        form.setError(name as FieldPath<In>, { type: 'server', message }, { shouldFocus: i === 0 });
      });
      if (rest !== null) form.setError('root.server', { type: 'server', message: rest });
    }
  });
  const server = errors.root?.server?.message;
  return (
    <form className={styles.form} aria-label={label} noValidate onSubmit={submit}>
      {children}
      {typeof server === 'string' && <Problem error={server} />}
      <div className={styles.foot}>
        <Button
          type="submit"
          kind={submitKind}
          busy={isSubmitting}
          wide={wideButton}
          size={wideButton ? 'large' : 'normal'}
        >
          {submitLabel}
        </Button>
        {beside}
      </div>
    </form>
  );
}

/** Whether the form shows a field of this dotted name. */
function hasField(fields: unknown, name: string): boolean {
  let at: unknown = fields;
  for (const part of name.split('.')) {
    if (typeof at !== 'object' || at === null || !(part in at)) return false;
    at = (at as Record<string, unknown>)[part];
  }
  return true;
}

export function FieldGroup({ legend, children }: { legend: string; children: ReactNode }) {
  return (
    <fieldset>
      <legend className={styles.legend}>{legend}</legend>
      <div className={styles.group}>{children}</div>
    </fieldset>
  );
}

/** Short fields side by side where there is room; `tight` for many very short ones. */
export const FieldRow = ({ tight = false, children }: { tight?: boolean; children: ReactNode }) => (
  <div className={styles.row} data-tight={tight ? '' : undefined}>
    {children}
  </div>
);
