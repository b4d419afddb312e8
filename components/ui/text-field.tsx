import { useId, type ReactNode, type Ref } from 'react';
import { TextInput, type TextInputProps } from 'react-native';
import { webStyle } from '@/components/theme/web-style.ts';
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
  readonly autoComplete?: TextInputProps['autoComplete'];
  readonly autoCapitalize?: 'none' | 'characters' | 'sentences';
  readonly placeholder?: string;
  readonly name?: string;
  /** For a gloved hand: taller, with larger letters. */
  readonly large?: boolean;
  readonly ref?: Ref<TextInput>;
};

const inputMode = { text: undefined, mail: 'email', password: undefined, search: 'search' } as const;

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
  return (
    <Field id={id} label={label} hint={hint} error={error} optional={optional} large={large}>
      <TextInput
        id={id}
        ref={ref}
        dataSet={{ look: 'control', field: name }}
        value={value}
        disabled={disabled}
        placeholder={placeholder}
        aria-invalid={error !== undefined}
        aria-describedby={describedBy(id, hint, error)}
        onBlur={onBlur}
        onChangeText={onChange}
        blurOnSubmit={false}
        {...(rows === undefined
          ? {
              inputMode: inputMode[kind],
              secureTextEntry: kind === 'password',
              autoComplete: autoComplete ?? 'off',
              autoCapitalize: autoCapitalize ?? (kind === 'text' ? 'sentences' : 'none'),
              spellCheck: kind === 'text',
              style: large && largeControl,
            }
          : { multiline: true, rows, style: [webStyle({ resize: 'vertical' }), large && largeControl] })}
      />
    </Field>
  );
}
