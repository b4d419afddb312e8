import { useId, type CSSProperties } from 'react';
import { roles } from '@/components/theme/roles.ts';
import { family } from '@/components/theme/type.ts';
import type { ChoiceProps } from './choice.tsx';
import { describedBy, FieldError, fieldIds } from './field.tsx';

/** One of a few: the browser's own radios share one tab stop and are walked by arrow keys, which React Native has not. */
export function RadioChoice<V extends string>({
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
              data-look={segments ? undefined : 'tick'}
              onBlur={onBlur}
              onChange={() => onChange(option.value)}
            />
          );
          return segments ? (
            <label key={option.value} data-look="segment">
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
