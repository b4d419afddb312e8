import type { CSSProperties, ReactNode } from 'react';
import { roles } from '@/components/theme/roles.ts';
import { family } from '@/components/theme/type.ts';

/** Ids that tie a control to its words. */
export const fieldIds = (id: string) => ({ hint: `${id}-hint`, error: `${id}-error` });

/** Label above, hint and error below a control; both belong to it by `aria-describedby`. */
export function Field({
  id,
  label,
  hint,
  error,
  optional = false,
  large = false,
  children,
}: {
  readonly id: string;
  readonly label: string;
  readonly hint?: ReactNode;
  readonly error?: string;
  readonly optional?: boolean;
  /** On operators' pages: larger, and nothing in soft ink. */
  readonly large?: boolean;
  readonly children: ReactNode;
}) {
  const ids = fieldIds(id);
  return (
    <div style={styles.field}>
      <label htmlFor={id} style={large ? { ...styles.label, ...largeText } : styles.label}>
        {label}
        {optional ? <span style={styles.optional}> (may stay empty)</span> : null}
      </label>
      {children}
      <span
        id={ids.hint}
        style={hint === undefined || hint === '' ? undefined : large ? { ...styles.hint, ...largeText } : styles.hint}
        aria-live="polite"
      >
        {hint}
      </span>
      <FieldError id={ids.error} error={error} />
    </div>
  );
}

/** What is wrong with a field; announced when it appears. */
export function FieldError({ id, error }: { readonly id: string; readonly error?: string }) {
  return (
    <span id={id} style={error === undefined ? undefined : styles.error} aria-live="polite">
      {error}
    </span>
  );
}

export const describedBy = (id: string, hint: ReactNode, error: string | undefined): string | undefined => {
  const ids = fieldIds(id);
  const list = [...(hint === undefined || hint === '' ? [] : [ids.hint]), ...(error === undefined ? [] : [ids.error])];
  return list.length === 0 ? undefined : list.join(' ');
};

const largeText = { fontSize: 18, lineHeight: '24px', color: roles.ink } as const;

/** A control for a gloved hand. */
export const largeControl = { minHeight: 64, fontSize: 24, lineHeight: '32px' } as const satisfies CSSProperties;

const text: CSSProperties = { marginTop: 4, fontFamily: family.reading, fontSize: 15, lineHeight: '20px' };
const styles = {
  field: { display: 'flex', flexDirection: 'column', minWidth: 0 },
  label: { marginBottom: 4, fontFamily: family.readingMedium, fontSize: 16, lineHeight: '22px', color: roles.ink },
  optional: { fontFamily: family.reading, color: roles.softInk, fontSize: 15 },
  hint: { ...text, color: roles.softInk },
  error: { ...text, color: roles.wrong, fontFamily: family.readingMedium },
} as const satisfies Record<string, CSSProperties>;
