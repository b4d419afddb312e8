import { useId, type CSSProperties, type ReactNode, type Ref } from 'react';
import { roles } from '@/components/theme/roles.ts';
import { family } from '@/components/theme/type.ts';
import { describedBy, Field, FieldError, fieldIds, largeControl } from './field.tsx';

export type ChoiceOption<V extends string> = { readonly value: V; readonly label: string; readonly hint?: string };

export type ChoiceProps<V extends string> = {
  readonly label: string;
  readonly options: readonly ChoiceOption<V>[];
  readonly value: V | null;
  readonly onChange: (value: V) => void;
  readonly onBlur?: () => void;
  /** 'segments' for two to four short words, 'radios' for options that need a sentence, 'list' for many. */
  readonly kind?: 'segments' | 'radios' | 'list';
  readonly hint?: ReactNode;
  readonly error?: string;
  readonly disabled?: boolean;
  /** Shown in a list while nothing is chosen. */
  readonly placeholder?: string;
  readonly name?: string;
  /** For a gloved hand: taller, with larger letters. */
  readonly large?: boolean;
  readonly ref?: Ref<HTMLSelectElement & HTMLInputElement>;
};

/** One of several. */
export function Choice<V extends string>(props: ChoiceProps<V>) {
  return props.kind === 'list' ? <ListChoice {...props} /> : <RadioChoice {...props} />;
}

function ListChoice<V extends string>({
  label,
  options,
  value,
  onChange,
  onBlur,
  hint,
  error,
  disabled,
  placeholder = 'Choose',
  name,
  large = false,
  ref,
}: ChoiceProps<V>) {
  const id = useId();
  return (
    <Field id={id} label={label} hint={hint} error={error} large={large}>
      <select
        id={id}
        ref={ref}
        name={name}
        className="cp-control"
        style={large ? largeControl : undefined}
        value={value ?? ''}
        disabled={disabled}
        aria-invalid={error !== undefined}
        aria-describedby={describedBy(id, hint, error)}
        onBlur={onBlur}
        onChange={(event) => {
          const chosen = options.find((option) => option.value === event.target.value);
          if (chosen !== undefined) onChange(chosen.value);
        }}
      >
        {value === null || !options.some((option) => option.value === value) ? (
          <option value={value ?? ''} disabled>
            {placeholder}
          </option>
        ) : null}
        {options.map((option) => (
          <option key={option.value} value={option.value}>
            {option.hint === undefined ? option.label : `${option.label} – ${option.hint}`}
          </option>
        ))}
      </select>
    </Field>
  );
}

function RadioChoice<V extends string>({
  label,
  options,
  value,
  onChange,
  onBlur,
  kind = 'segments',
  hint,
  error,
  disabled,
  large = false,
  ref,
}: ChoiceProps<V>) {
  const id = useId();
  const ids = fieldIds(id);
  const segments = kind === 'segments';
  return (
    <fieldset style={styles.set} aria-describedby={describedBy(id, hint, error)} disabled={disabled}>
      <legend style={large ? { ...styles.legend, fontSize: 18, lineHeight: '24px' } : styles.legend}>{label}</legend>
      <div style={segments ? styles.segments : styles.radios}>
        {options.map((option, index) => {
          const input = (
            <input
              ref={index === 0 ? ref : undefined}
              type="radio"
              name={id}
              value={option.value}
              checked={option.value === value}
              className={segments ? undefined : 'cp-tick'}
              onBlur={onBlur}
              onChange={() => onChange(option.value)}
            />
          );
          return segments ? (
            <label key={option.value} className="cp-segment">
              {input}
              <span>{option.label}</span>
            </label>
          ) : (
            <label key={option.value} style={large ? { ...styles.radio, ...styles.radioLarge } : styles.radio}>
              {input}
              <span style={large ? { ...styles.words, fontSize: 20, lineHeight: '28px' } : styles.words}>
                {option.label}
                {option.hint === undefined ? null : <span style={styles.optionHint}>{option.hint}</span>}
              </span>
            </label>
          );
        })}
      </div>
      {hint === undefined ? null : (
        <span id={ids.hint} style={styles.optionHint}>
          {hint}
        </span>
      )}
      <FieldError id={ids.error} error={error} />
    </fieldset>
  );
}

const styles = {
  set: { border: 0, padding: 0, margin: 0, minWidth: 0, display: 'flex', flexDirection: 'column', gap: 4 },
  legend: {
    padding: 0,
    marginBottom: 4,
    fontFamily: family.readingMedium,
    fontSize: 16,
    lineHeight: '22px',
    color: roles.ink,
  },
  segments: { display: 'flex' },
  radios: { display: 'flex', flexDirection: 'column' },
  radio: { display: 'flex', alignItems: 'flex-start', gap: 12, padding: '10px 0', minHeight: 48, cursor: 'pointer' },
  radioLarge: { alignItems: 'center', minHeight: 64 },
  words: {
    display: 'flex',
    flexDirection: 'column',
    fontFamily: family.reading,
    fontSize: 17,
    lineHeight: '26px',
    color: roles.ink,
  },
  optionHint: { fontFamily: family.reading, fontSize: 15, lineHeight: '20px', color: roles.softInk },
} as const satisfies Record<string, CSSProperties>;
