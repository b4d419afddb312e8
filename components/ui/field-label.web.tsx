import type { CSSProperties, ReactNode } from 'react';
import { roles } from '@/components/theme/roles.ts';
import { family } from '@/components/theme/type.ts';

/** The page's own label: it names a control for readers and password managers, and a press on it leads there. React Native has none. */
export function FieldLabel({
  id,
  children,
  optional,
  large,
}: {
  /** The control's. */
  readonly id: string;
  readonly children: ReactNode;
  readonly optional: boolean;
  readonly large: boolean;
}) {
  return (
    <label htmlFor={id} style={large ? { ...styles.label, fontSize: 18, lineHeight: '24px' } : styles.label}>
      {children}
      {optional ? <span style={styles.optional}> (may stay empty)</span> : null}
    </label>
  );
}

const styles = {
  label: { marginBottom: 4, fontFamily: family.readingMedium, fontSize: 16, lineHeight: '22px', color: roles.ink },
  optional: { fontFamily: family.reading, color: roles.softInk, fontSize: 15 },
} as const satisfies Record<string, CSSProperties>;
