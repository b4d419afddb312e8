import { StyleSheet, View } from 'react-native';
import { webStyle } from '@/components/theme/web-style.ts';
import { Figure, Label } from '@/components/ui/text.tsx';

export type FigureCell = { label: string; value: string; unit?: string };

/** Figures to be read from an arm's length: label in ink above a large number, two beside each other where they fit. */
export function FigureCells({ cells, label }: { cells: readonly FigureCell[]; label: string }) {
  return (
    <View role="list" aria-label={label} style={styles.cells}>
      {cells.map((cell) => (
        <View key={cell.label} role="listitem" style={styles.cell}>
          <View role="term">
            <Label large>{cell.label}</Label>
          </View>
          <View role="definition">
            <Figure large value={cell.value} unit={cell.unit} />
          </View>
        </View>
      ))}
    </View>
  );
}

const styles = StyleSheet.create({
  cells: webStyle({
    display: 'grid',
    gridTemplateColumns: 'repeat(auto-fill, minmax(min(150px, 100%), 1fr))',
    columnGap: 16,
    rowGap: 12,
  }),
  cell: { minWidth: 0 },
});
