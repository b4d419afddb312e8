import { StyleSheet, Text, View } from 'react-native';
import { roles } from '@/components/theme/roles.ts';
import { family } from '@/components/theme/type.ts';
import { webStyle } from '@/components/theme/web-style.ts';

export type FigureColumn = { readonly id: string; readonly label: string; readonly strong?: boolean };

export type FigureRow = {
  readonly id: string;
  readonly label: string;
  /** A part of the row above it: set in, and smaller. */
  readonly part?: boolean;
  /** One a column: the figure, and a second one below it in another voice. */
  readonly cells: readonly { readonly figure: string; readonly below?: string }[];
};

/** Figures of several things side by side. `corner` names the first column aloud. */
export function FigureTable({
  label,
  corner,
  columns,
  rows,
}: {
  readonly label: string;
  readonly corner: string;
  readonly columns: readonly FigureColumn[];
  readonly rows: readonly FigureRow[];
}) {
  return (
    <View role="table" aria-label={label}>
      <View role="row" style={[styles.row, styles.head]}>
        <View role="columnheader" style={styles.label}>
          <Text style={styles.unseen}>{corner}</Text>
        </View>
        {columns.map(({ id, label: name, strong = false }) => (
          <View key={id} role="columnheader" style={styles.cell}>
            <Text style={[styles.column, strong && styles.strong]}>{name}</Text>
          </View>
        ))}
      </View>
      {rows.map(({ id, label: name, part = false, cells }) => (
        <View key={id} role="row" style={[styles.row, part ? styles.part : styles.whole]}>
          <View role="rowheader" style={styles.label}>
            <Text style={[styles.name, part && styles.partName]}>{name}</Text>
          </View>
          {columns.map(({ id: column }, i) => (
            <View key={column} role="cell" style={styles.cell}>
              <Text style={[styles.figure, part && styles.partFigure]}>{cells[i]?.figure}</Text>
              {cells[i]?.below === undefined ? null : <Text style={styles.below}>{cells[i].below}</Text>}
            </View>
          ))}
        </View>
      ))}
    </View>
  );
}

const figure = {
  fontFamily: family.figure,
  color: roles.ink,
  fontVariant: ['tabular-nums' as const],
  ...webStyle({ whiteSpace: 'nowrap' }),
};

const styles = StyleSheet.create({
  row: { flexDirection: 'row', gap: 12, paddingVertical: 5, alignItems: 'baseline' },
  head: { borderBottomWidth: 1, borderBottomColor: roles.ink },
  whole: { borderTopWidth: 1, borderTopColor: roles.rule },
  part: { paddingVertical: 2 },
  label: { flexGrow: 1.3, flexShrink: 1, flexBasis: 0, minWidth: 0 },
  cell: { flexGrow: 1, flexShrink: 1, flexBasis: 0, minWidth: 0, alignItems: 'flex-end' },
  unseen: {
    position: 'absolute',
    width: 1,
    height: 1,
    overflow: 'hidden',
    ...webStyle({ clipPath: 'inset(50%)', whiteSpace: 'nowrap' }),
  },
  column: { fontFamily: family.label, fontSize: 16, lineHeight: 20, color: roles.softInk, textAlign: 'right' },
  strong: { fontFamily: family.readingStrong, color: roles.ink },
  name: { fontFamily: family.reading, fontSize: 16, lineHeight: 22, color: roles.ink },
  partName: { paddingLeft: 12, fontSize: 15, lineHeight: 20, color: roles.softInk },
  figure: { ...figure, fontSize: 18, lineHeight: 22 },
  partFigure: { fontSize: 16, lineHeight: 20 },
  below: { ...figure, fontSize: 15, lineHeight: 18, color: roles.softInk },
});
