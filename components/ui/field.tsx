import type { ReactNode } from 'react';
import { StyleSheet, Text, View } from 'react-native';
import { roles } from '@/components/theme/roles.ts';
import { family } from '@/components/theme/type.ts';
import { FieldLabel } from './field-label.web.tsx';

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
    <View style={styles.field}>
      <FieldLabel id={id} optional={optional} large={large}>
        {label}
      </FieldLabel>
      {children}
      <Text
        id={ids.hint}
        aria-live="polite"
        style={hint === undefined || hint === '' ? undefined : [styles.hint, large && styles.large]}
      >
        {hint}
      </Text>
      <FieldError id={ids.error} error={error} />
    </View>
  );
}

/** What is wrong with a field; announced when it appears. */
export function FieldError({ id, error }: { readonly id: string; readonly error?: string }) {
  return (
    <Text id={id} style={error === undefined ? undefined : styles.error} aria-live="polite">
      {error}
    </Text>
  );
}

export const describedBy = (id: string, hint: ReactNode, error: string | undefined): string | undefined => {
  const ids = fieldIds(id);
  const list = [...(hint === undefined || hint === '' ? [] : [ids.hint]), ...(error === undefined ? [] : [ids.error])];
  return list.length === 0 ? undefined : list.join(' ');
};

/** A control for a gloved hand. */
export const largeControl = { minHeight: 64, fontSize: 24, lineHeight: 32 } as const;

const text = { marginTop: 4, fontFamily: family.reading, fontSize: 15, lineHeight: 20 } as const;
const styles = StyleSheet.create({
  field: { minWidth: 0 },
  hint: { ...text, color: roles.softInk },
  large: { fontSize: 18, lineHeight: 24, color: roles.ink },
  error: { ...text, color: roles.wrong, fontFamily: family.readingMedium },
});
