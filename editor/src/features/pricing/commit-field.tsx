import { type KeyboardEvent, useId, useState } from 'react';
import form from '../../components/form/form.module.css';

interface CommitFieldProps {
  readonly label: string;
  readonly hint?: string;
  /** The label is only for screen readers: a column head or a legend says it already. */
  readonly hideLabel?: boolean;
  /** What stands there while nobody types. */
  readonly value: string;
  /** Takes what was typed when the field is left; a sentence when it can't be taken. */
  readonly onCommit: (text: string) => string | null;
  readonly unit?: string;
  readonly numeric?: boolean;
  readonly rows?: number;
  readonly maxLength?: number;
  readonly placeholder?: string;
  readonly disabled?: boolean;
}

/** A field that is an edit by itself: it is taken when one leaves it or presses Enter; Escape puts it back. */
export function CommitField({
  label,
  hint,
  hideLabel = false,
  value,
  onCommit,
  unit,
  numeric = false,
  rows,
  maxLength,
  placeholder,
  disabled,
}: CommitFieldProps) {
  const id = useId();
  const [typed, setTyped] = useState<string | null>(null);
  const [fault, setFault] = useState<string | null>(null);

  const leave = () => {
    if (typed === null) return;
    if (typed === value) {
      setTyped(null);
      setFault(null);
      return;
    }
    const refused = onCommit(typed);
    setFault(refused);
    if (refused === null) setTyped(null);
  };
  const onKeyDown = (event: KeyboardEvent) => {
    if (event.key === 'Enter' && rows === undefined) leave();
    if (event.key === 'Escape' && typed !== null) {
      event.stopPropagation();
      setTyped(null);
      setFault(null);
    }
  };
  const common = {
    id,
    value: typed ?? value,
    maxLength,
    placeholder,
    disabled,
    'aria-invalid': fault !== null || undefined,
    'aria-describedby': [hint && `${id}-hint`, fault && `${id}-fault`].filter(Boolean).join(' ') || undefined,
    onBlur: leave,
    onKeyDown,
    onChange: (event: { target: { value: string } }) => setTyped(event.target.value),
  };
  return (
    <div className={form.field}>
      <label htmlFor={id} className={hideLabel ? 'visually-hidden' : form.label}>
        {label}
      </label>
      {hint && (
        <span id={`${id}-hint`} className={form.hint}>
          {hint}
        </span>
      )}
      {rows === undefined ? (
        <span className={form.control}>
          <input
            {...common}
            type="text"
            inputMode={numeric ? 'decimal' : undefined}
            autoComplete="off"
            className={numeric ? `${form.input} ${form.number}` : form.input}
          />
          {unit && <span className={form.unit}>{unit}</span>}
        </span>
      ) : (
        <textarea {...common} rows={rows} className={form.area} />
      )}
      {fault && (
        <span id={`${id}-fault`} className={form.error} role="alert">
          {fault}
        </span>
      )}
    </div>
  );
}
