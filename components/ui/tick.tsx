import { useId, type ReactNode, type Ref } from 'react';
import { roles } from '@/components/theme/roles.ts';
import { family } from '@/components/theme/type.ts';
import { FieldError, fieldIds } from './field.tsx';

/** A box to tick; the whole line is its target. `large` on operators' pages. */
export function Tick({
  label,
  checked,
  onChange,
  onBlur,
  hint,
  error,
  disabled,
  large = false,
  ref,
}: {
  readonly label: string;
  readonly checked: boolean;
  readonly onChange: (checked: boolean) => void;
  readonly onBlur?: () => void;
  readonly hint?: ReactNode;
  readonly error?: string;
  readonly disabled?: boolean;
  readonly large?: boolean;
  readonly ref?: Ref<HTMLInputElement>;
}) {
  const ids = fieldIds(useId());
  return (
    <div>
      <label
        style={{
          display: 'flex',
          alignItems: 'center',
          gap: 14,
          minHeight: large ? 64 : 48,
          cursor: disabled === true ? 'default' : 'pointer',
          fontFamily: family.reading,
          fontSize: large ? 19 : 17,
          lineHeight: large ? '26px' : '24px',
          color: roles.ink,
        }}
      >
        <input
          ref={ref}
          type="checkbox"
          className="cp-tick"
          checked={checked}
          disabled={disabled}
          aria-invalid={error !== undefined}
          aria-describedby={error === undefined ? undefined : ids.error}
          onBlur={onBlur}
          onChange={(event) => onChange(event.target.checked)}
        />
        <span>
          {label}
          {hint === undefined ? null : (
            <span style={{ display: 'block', fontSize: 15, lineHeight: '20px', color: roles.softInk }}>{hint}</span>
          )}
        </span>
      </label>
      <FieldError id={ids.error} error={error} />
    </div>
  );
}
