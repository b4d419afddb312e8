import type { CSSProperties } from 'react';
import { roles } from '@/components/theme/roles.ts';
import { family } from '@/components/theme/type.ts';
import { Figure } from '@/components/ui/text.tsx';

export type FigureCell = { label: string; value: string; unit?: string };

/** Figures to be read from an arm's length: label in ink above a large number, two beside each other where they fit. */
export function FigureCells({ cells, label }: { cells: readonly FigureCell[]; label: string }) {
  return (
    <dl aria-label={label} style={styles.cells}>
      {cells.map((cell) => (
        <div key={cell.label} style={styles.cell}>
          <dt style={styles.label}>{cell.label}</dt>
          <dd style={styles.value}>
            <Figure large value={cell.value} unit={cell.unit} />
          </dd>
        </div>
      ))}
    </dl>
  );
}

const styles = {
  cells: {
    display: 'grid',
    gridTemplateColumns: 'repeat(auto-fill, minmax(min(150px, 100%), 1fr))',
    columnGap: 16,
    rowGap: 12,
    margin: 0,
  },
  cell: { minWidth: 0 },
  label: { fontFamily: family.label, fontSize: 18, lineHeight: '23px', color: roles.ink },
  value: { margin: 0 },
} as const satisfies Record<string, CSSProperties>;
