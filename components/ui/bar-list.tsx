import { StyleSheet, Text, View } from 'react-native';
import { roles } from '@/components/theme/roles.ts';
import type { Role } from '@/components/theme/tokens.ts';
import { family } from '@/components/theme/type.ts';
import { webStyle } from '@/components/theme/web-style.ts';

export type Bar = {
  readonly id: string;
  readonly label: string;
  readonly figure: string;
  /** What follows the figure in a second voice. */
  readonly aside?: string;
  /** All of the row, as it is read aloud. */
  readonly spoken: string;
  /** Length, 0..1 of the row. */
  readonly share: number;
  readonly tone: Role;
  /** An edge alone: told apart by shape, not by colour alone. */
  readonly open?: boolean;
};

/** Figures as bars on one scale, each with its words above; a thin line stands at `mark`, 0..1 of the rows. */
export function BarList({
  label,
  bars,
  mark,
}: {
  readonly label: string;
  readonly bars: readonly Bar[];
  readonly mark: number;
}) {
  return (
    <View role="list" aria-label={label} style={styles.list}>
      {bars.map(({ id, label: what, figure, aside, spoken, share, tone, open = false }) => (
        <View key={id} role="listitem" style={styles.row}>
          <Text style={styles.spoken}>{spoken}</Text>
          <View aria-hidden style={styles.words}>
            <Text style={styles.label}>{what}</Text>
            <Text style={styles.figure}>
              {figure}
              {aside === undefined ? null : <Text style={styles.aside}>{aside}</Text>}
            </Text>
          </View>
          <View aria-hidden style={styles.track}>
            <View
              style={[
                styles.bar,
                {
                  width: percent(share),
                  borderColor: roles[tone],
                  backgroundColor: open ? 'transparent' : roles[tone],
                },
              ]}
            />
            <View style={[styles.mark, { left: percent(mark) }]} />
          </View>
        </View>
      ))}
    </View>
  );
}

const percent = (share: number) => `${Math.round(share * 1000) / 10}%` as const;

const styles = StyleSheet.create({
  list: { gap: 14 },
  row: { gap: 4 },
  spoken: {
    position: 'absolute',
    width: 1,
    height: 1,
    overflow: 'hidden',
    ...webStyle({ clipPath: 'inset(50%)', whiteSpace: 'nowrap' }),
  },
  words: { flexDirection: 'row', justifyContent: 'space-between', alignItems: 'baseline', gap: 16 },
  label: { flexShrink: 1, fontFamily: family.reading, fontSize: 16, lineHeight: 22, color: roles.ink },
  figure: {
    fontFamily: family.figure,
    fontSize: 19,
    lineHeight: 22,
    color: roles.ink,
    fontVariant: ['tabular-nums'],
    ...webStyle({ whiteSpace: 'nowrap' }),
  },
  aside: { fontSize: 17, color: roles.softInk, marginLeft: 10 },
  track: { height: 12, borderBottomWidth: 1, borderBottomColor: roles.rule },
  bar: { position: 'absolute', left: 0, top: 0, height: 10, borderWidth: 1.5 },
  mark: { position: 'absolute', top: -3, width: 1, height: 18, backgroundColor: roles.ink },
});
