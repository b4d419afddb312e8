import type { CSSProperties, ReactNode } from 'react';
import { useLayout } from '@/components/theme/layout.ts';
import { roles } from '@/components/theme/roles.ts';
import { family } from '@/components/theme/type.ts';

export type SheetCell = {
  readonly label: string;
  /** Text is set as a figure; anything else as it is. */
  readonly value: ReactNode;
  /** Share of the width on a wide screen. */
  readonly share?: number;
};

/** The title block under a drawing: what it is of. Cells beside each other on a wide screen, stacked on a phone. */
export function Sheet({ cells, label }: { readonly cells: readonly SheetCell[]; readonly label?: string }) {
  const { wide } = useLayout();
  return (
    <dl aria-label={label} style={{ ...styles.block, flexDirection: wide ? 'row' : 'column' }}>
      {cells.map((cell, index) => (
        <div
          key={cell.label}
          style={{
            ...styles.cell,
            ...(wide ? { flex: `${cell.share ?? 1} 1 0`, display: 'block' } : styles.stacked),
            ...(index === 0 ? {} : wide ? { borderLeft: edge } : { borderTop: `1px solid ${roles.rule}` }),
          }}
        >
          <dt style={styles.label}>{cell.label}</dt>
          <dd style={{ ...styles.value, textAlign: wide ? 'left' : 'right' }}>{cell.value}</dd>
        </div>
      ))}
    </dl>
  );
}

const edge = `1px solid ${roles.ink}`;
const styles = {
  block: { display: 'flex', margin: 0, border: edge, borderRadius: 3, background: roles.sheet },
  cell: { padding: '9px 12px', minWidth: 0 },
  stacked: { display: 'flex', justifyContent: 'space-between', alignItems: 'baseline', gap: 16 },
  label: { fontFamily: family.label, fontSize: 14, lineHeight: '18px', color: roles.softInk },
  value: {
    margin: 0,
    fontFamily: family.figure,
    fontSize: 20,
    lineHeight: '25px',
    color: roles.ink,
    fontVariantNumeric: 'tabular-nums',
    overflowWrap: 'anywhere',
  },
} as const satisfies Record<string, CSSProperties>;
