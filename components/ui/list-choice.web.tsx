import { useId } from 'react';
import type { ChoiceProps } from './choice.tsx';
import { describedBy, Field } from './field.tsx';

/** One of many: React Native has no list that a phone opens in its own way, the browser's `select` is one. */
export function ListChoice<V extends string>({
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
        data-look="control"
        style={large ? { minHeight: 64, fontSize: 24, lineHeight: '32px' } : undefined}
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
