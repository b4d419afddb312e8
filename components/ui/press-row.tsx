import type { CSSProperties, ReactNode } from 'react';
import { roles } from '@/components/theme/roles.ts';

/** A row of a list that chooses something on the same page; at least 56 px high. */
export function PressRow({
  children,
  left,
  right,
  chosen,
  spoken,
  onPress,
}: {
  readonly children: ReactNode;
  readonly left?: ReactNode;
  readonly right?: ReactNode;
  readonly chosen: boolean;
  /** Name of the row when its content reads badly aloud. */
  readonly spoken?: string;
  readonly onPress: () => void;
}) {
  return (
    <button
      type="button"
      className="cp-row"
      aria-pressed={chosen}
      aria-label={spoken}
      onClick={onPress}
      style={{
        ...styles.row,
        borderLeft: `4px solid ${chosen ? roles.ember : 'transparent'}`,
        ...(chosen ? { background: roles.touched } : {}),
      }}
    >
      {left}
      <span style={styles.middle}>{children}</span>
      {right}
    </button>
  );
}

const styles = {
  row: {
    display: 'flex',
    alignItems: 'center',
    gap: 12,
    width: '100%',
    minHeight: 56,
    padding: '8px 4px 8px 8px',
    margin: 0,
    border: 0,
    background: 'transparent',
    color: roles.ink,
    textAlign: 'left',
    font: 'inherit',
    cursor: 'pointer',
  },
  middle: { flex: 1, minWidth: 0, display: 'flex', flexDirection: 'column', gap: 2 },
} as const satisfies Record<string, CSSProperties>;
