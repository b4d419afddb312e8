import { Pressable, StyleSheet, Text } from 'react-native';
import { unbroken } from '@/components/text/common.ts';
import { roles } from '@/components/theme/roles.ts';
import { touch } from '@/components/theme/space.ts';
import { family } from '@/components/theme/type.ts';
import { webStyle } from '@/components/theme/web-style.ts';

/** A figure that tells more when pressed, underlined in dots; with a label above it, it is a whole cell of a grid. */
export function FigureButton({
  value,
  label,
  spoken,
  onPress,
  align = 'left',
}: {
  readonly value: string;
  readonly label?: string;
  readonly spoken: string;
  readonly onPress: () => void;
  readonly align?: 'left' | 'right';
}) {
  return (
    <Pressable
      role="button"
      aria-label={spoken}
      onPress={onPress}
      style={label === undefined ? styles.alone : [styles.cell, ringInside]}
    >
      {label === undefined ? null : <Text style={styles.label}>{label}</Text>}
      <Text style={[styles.value, { textAlign: align }]}>{unbroken(value)}</Text>
    </Pressable>
  );
}

// written on the element itself, so that it stands above the stylesheet's own ring
const ringInside = { outlineOffset: -3 };

const styles = StyleSheet.create({
  // as tall as a finger without making its line taller
  alone: { minWidth: touch.least, minHeight: touch.least, marginVertical: -11, justifyContent: 'center' },
  cell: {
    minWidth: 0,
    minHeight: 62,
    paddingVertical: 9,
    paddingHorizontal: 10,
    backgroundColor: roles.sheet,
  },
  label: { fontFamily: family.label, fontSize: 14, lineHeight: 18, color: roles.softInk },
  value: {
    fontFamily: family.figure,
    fontSize: 20,
    lineHeight: 25,
    color: roles.ink,
    fontVariant: ['tabular-nums'],
    textDecorationLine: 'underline',
    textDecorationStyle: 'dotted',
    textDecorationColor: roles.softInk,
    ...webStyle({ textUnderlineOffset: 4 }),
  },
});
