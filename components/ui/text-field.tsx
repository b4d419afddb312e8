import { useId, type InputHTMLAttributes, type ReactNode, type Ref } from 'react';
import { describedBy, Field, largeControl } from './field.tsx';

export type TextFieldProps = {
  readonly label: string;
  readonly value: string;
  readonly onChange: (value: string) => void;
  readonly onBlur?: () => void;
  readonly hint?: ReactNode;
  readonly error?: string;
  readonly optional?: boolean;
  readonly disabled?: boolean;
  readonly kind?: 'text' | 'mail' | 'password' | 'search';
  /** Several lines. */
  readonly rows?: number;
  readonly autoComplete?: InputHTMLAttributes<HTMLInputElement>['autoComplete'];
  readonly autoCapitalize?: 'none' | 'characters' | 'sentences';
  readonly placeholder?: string;
  readonly name?: string;
  /** For a gloved hand: taller, with larger letters. */
  readonly large?: boolean;
  readonly ref?: Ref<HTMLInputElement & HTMLTextAreaElement>;
};

const inputType = { text: 'text', mail: 'email', password: 'password', search: 'search' } as const;

/** A field for words. */
export function TextField({
  label,
  value,
  onChange,
  onBlur,
  hint,
  error,
  optional,
  disabled,
  kind = 'text',
  rows,
  autoComplete,
  autoCapitalize,
  placeholder,
  name,
  large = false,
  ref,
}: TextFieldProps) {
  const id = useId();
  const shared = {
    id,
    ref,
    name,
    value,
    disabled,
    placeholder,
    className: 'cp-control',
    'aria-invalid': error !== undefined,
    'aria-describedby': describedBy(id, hint, error),
    onBlur,
  };
  return (
    <Field id={id} label={label} hint={hint} error={error} optional={optional} large={large}>
      {rows === undefined ? (
        <input
          {...shared}
          type={inputType[kind]}
          autoComplete={autoComplete ?? 'off'}
          autoCapitalize={autoCapitalize ?? (kind === 'text' ? undefined : 'none')}
          spellCheck={kind === 'text' ? undefined : false}
          style={large ? largeControl : undefined}
          onChange={(event) => onChange(event.target.value)}
        />
      ) : (
        <textarea
          {...shared}
          rows={rows}
          onChange={(event) => onChange(event.target.value)}
          style={{ resize: 'vertical', ...(large ? largeControl : {}) }}
        />
      )}
    </Field>
  );
}
