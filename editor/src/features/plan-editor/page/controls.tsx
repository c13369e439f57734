import { formatLength, meters, parseLength } from '@lampwright/geometry/units';
import { type KeyboardEvent, type ReactNode, useId, useState } from 'react';
import { useUnitSystem } from './context';
import styles from './controls.module.css';

interface CommitProps {
  readonly label: string;
  /** What it is now; null shows nothing (or `mixed` does). */
  readonly value: string;
  readonly placeholder?: string | undefined;
  readonly disabled?: boolean | undefined;
  readonly hint?: ReactNode;
  readonly unit?: string | undefined;
  readonly inputMode?: 'text' | 'decimal' | undefined;
  readonly maxLength?: number | undefined;
  readonly inputId?: string | undefined;
  /** Takes over what was typed. Gives the sentence that says why not, or null. */
  readonly commit: (text: string) => string | null;
}

/** A field that takes effect when it is left or Enter is pressed; Esc puts back what was there. */
export function CommitField(props: CommitProps) {
  const { label, value, commit, hint, unit } = props;
  const own = useId();
  const id = props.inputId ?? own;
  const [text, setText] = useState(value);
  const [error, setError] = useState<string | null>(null);
  // While rendering, not in an effect: that could come after what somebody typed meanwhile, and undo it.
  const [shown, setShown] = useState(value);
  if (shown !== value) {
    setShown(value);
    setText(value);
    setError(null);
  }
  const take = () => {
    if (text === value) {
      setError(null);
      return;
    }
    const fault = commit(text);
    setError(fault);
    // A refusal elsewhere leaves the value as it was; the field then says so too.
    if (fault === null) setText(value);
  };
  const onKeyDown = (event: KeyboardEvent) => {
    if (event.key === 'Enter') take();
    if (event.key === 'Escape' && text !== value) {
      event.stopPropagation();
      setText(value);
      setError(null);
    }
  };
  const described = [hint === undefined ? null : `${id}-hint`, error === null ? null : `${id}-error`]
    .filter(Boolean)
    .join(' ');
  return (
    <div className={styles.field}>
      <label htmlFor={id}>{label}</label>
      <span className={styles.control}>
        <input
          id={id}
          type="text"
          inputMode={props.inputMode ?? 'text'}
          autoComplete="off"
          value={text}
          placeholder={props.placeholder}
          disabled={props.disabled}
          maxLength={props.maxLength}
          aria-invalid={error !== null || undefined}
          aria-describedby={described || undefined}
          onChange={(event) => setText(event.target.value)}
          onBlur={take}
          onKeyDown={onKeyDown}
        />
        {unit !== undefined && <span className={styles.unit}>{unit}</span>}
      </span>
      {hint !== undefined && (
        <span id={`${id}-hint`} className={styles.hint}>
          {hint}
        </span>
      )}
      {error !== null && (
        <span id={`${id}-error`} className={styles.error} role="alert">
          {error}
        </span>
      )}
    </div>
  );
}

interface LengthProps {
  readonly label: string;
  readonly value: number | null;
  /** What an emptied field means: null is taken as the value, undefined refuses it. */
  readonly empty?: 'null' | 'refused';
  readonly placeholder?: string;
  readonly mixed?: boolean;
  readonly disabled?: boolean;
  readonly hint?: ReactNode;
  /** The sentence that says why a length can't be taken, or null. */
  readonly check?: (meters: number) => string | null;
  readonly commit: (meters: number | null) => void;
}

/** A length in the person's units: feet and inches or metres, whatever they type. */
export function LengthField({
  label,
  value,
  empty = 'refused',
  placeholder,
  mixed,
  disabled,
  hint,
  check,
  commit,
}: LengthProps) {
  const system = useUnitSystem();
  const shown =
    mixed || value === null ? '' : formatLength(meters(value), { system, precision: 'half-inch' });
  return (
    <CommitField
      label={label}
      value={shown}
      placeholder={mixed ? 'several' : placeholder}
      disabled={disabled}
      hint={hint}
      commit={(text) => {
        if (text.trim() === '' && empty === 'null') {
          commit(null);
          return null;
        }
        const parsed = parseLength(text, { preferred: system });
        if (!parsed.ok) return parsed.message;
        const fault = check?.(parsed.meters) ?? null;
        if (fault !== null) return fault;
        commit(parsed.meters);
        return null;
      }}
    />
  );
}

interface SelectProps {
  readonly label: string;
  readonly value: string;
  readonly options: readonly { readonly value: string; readonly label: string; readonly group?: string }[];
  readonly disabled?: boolean;
  readonly mixed?: boolean;
  readonly none?: string;
  readonly onChange: (value: string) => void;
}

export function SelectField({ label, value, options, disabled, mixed, none, onChange }: SelectProps) {
  const id = useId();
  const known = options.some((o) => o.value === value);
  return (
    <div className={styles.field}>
      <label htmlFor={id}>{label}</label>
      <select
        id={id}
        value={mixed || (!known && none === undefined) ? '' : value}
        disabled={disabled}
        onChange={(event) => onChange(event.target.value)}
      >
        {mixed && <option value="">several</option>}
        {!mixed && !known && none === undefined && <option value="">not chosen</option>}
        {none !== undefined && !mixed && <option value="">{none}</option>}
        {options.map((option) => (
          <option key={option.value} value={option.value}>
            {option.label}
          </option>
        ))}
      </select>
    </div>
  );
}
