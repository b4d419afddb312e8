import { roles } from '@/components/theme/roles.ts';
import { family } from '@/components/theme/type.ts';
import type { TickProps } from './tick.tsx';

/** The browser's own checkbox with its words: react-native-web's press areas don't take the space bar for one. */
export function TickBox({
  label,
  checked,
  onChange,
  onBlur,
  hint,
  error,
  disabled,
  large = false,
  ref,
  describedBy,
}: TickProps & { readonly describedBy?: string }) {
  return (
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
        data-look="tick"
        checked={checked}
        disabled={disabled}
        aria-invalid={error !== undefined}
        aria-describedby={describedBy}
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
  );
}
