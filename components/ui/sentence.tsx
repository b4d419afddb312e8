import type { CSSProperties, ReactNode } from 'react';
import { useLayout } from '@/components/theme/layout.ts';
import { roles } from '@/components/theme/roles.ts';
import { family } from '@/components/theme/type.ts';

/** Words and numbers in one flow: what an `InlineNumber` stands in. */
export function Sentence({ children }: { readonly children: ReactNode }) {
  return <div style={styles.sentence}>{children}</div>;
}

/** Words of a sentence in a second voice: what follows from the numbers. */
export function Aside({
  children,
  tone = 'softInk',
}: {
  readonly children: ReactNode;
  readonly tone?: 'softInk' | 'cold' | 'hot';
}) {
  return <span style={{ ...styles.aside, color: roles[tone] }}>{children}</span>;
}

/** A small press within a sentence, as tall as a finger. */
export function InlineButton({
  label,
  spoken,
  onPress,
}: {
  readonly label: string;
  readonly spoken: string;
  readonly onPress: () => void;
}) {
  return (
    <button
      type="button"
      aria-label={spoken}
      onClick={onPress}
      style={{ ...styles.button, minHeight: useLayout().wide ? 38 : 48 }}
    >
      {label}
    </button>
  );
}

const styles = {
  sentence: {
    fontFamily: family.reading,
    fontSize: 17,
    lineHeight: '26px',
    color: roles.ink,
    overflowWrap: 'anywhere',
  },
  aside: { fontFamily: family.reading, fontSize: 16 },
  button: {
    fontFamily: family.reading,
    fontSize: 15,
    lineHeight: '20px',
    color: roles.softInk,
    background: 'transparent',
    border: 0,
    minWidth: 44,
    padding: '0 8px',
    margin: 0,
    textDecoration: 'underline',
    textUnderlineOffset: 4,
    verticalAlign: 'middle',
    cursor: 'pointer',
  },
} as const satisfies Record<string, CSSProperties>;
