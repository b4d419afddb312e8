import type { ReactNode } from 'react';
import { Pressable, StyleSheet, Text } from 'react-native';
import { useLayout } from '@/components/theme/layout.ts';
import { roles } from '@/components/theme/roles.ts';
import { family } from '@/components/theme/type.ts';
import { webStyle } from '@/components/theme/web-style.ts';

/** Words and numbers in one flow: what an `InlineNumber` stands in. */
export function Sentence({ children }: { readonly children: ReactNode }) {
  return <Text style={styles.sentence}>{children}</Text>;
}

/** Words of a sentence in a second voice: what follows from the numbers. */
export function Aside({
  children,
  tone = 'softInk',
}: {
  readonly children: ReactNode;
  readonly tone?: 'softInk' | 'cold' | 'hot';
}) {
  return <Text style={[styles.aside, { color: roles[tone] }]}>{children}</Text>;
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
    <Pressable
      role="button"
      aria-label={spoken}
      onPress={onPress}
      style={[styles.button, { minHeight: useLayout().wide ? 38 : 48 }]}
    >
      <Text style={styles.words}>{label}</Text>
    </Pressable>
  );
}

const styles = StyleSheet.create({
  sentence: {
    fontFamily: family.reading,
    fontSize: 17,
    lineHeight: 26,
    color: roles.ink,
    ...webStyle({ overflowWrap: 'anywhere', whiteSpace: 'normal' }),
  },
  aside: { fontFamily: family.reading, fontSize: 16 },
  button: {
    minWidth: 44,
    paddingHorizontal: 8,
    justifyContent: 'center',
    ...webStyle({ display: 'inline-flex', verticalAlign: 'baseline' }),
  },
  words: {
    fontFamily: family.reading,
    fontSize: 15,
    lineHeight: 20,
    color: roles.softInk,
    textAlign: 'center',
    textDecorationLine: 'underline',
    ...webStyle({ textUnderlineOffset: 4 }),
  },
});
