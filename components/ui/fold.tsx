import { useState, type ReactNode } from 'react';
import { Pressable, StyleSheet, Text, View } from 'react-native';
import { roles } from '@/components/theme/roles.ts';
import { family } from '@/components/theme/type.ts';
import { webStyle } from '@/components/theme/web-style.ts';

/** What few need to see: behind a line that opens it. */
export function Fold({ label, children }: { readonly label: string; readonly children: ReactNode }) {
  const [open, setOpen] = useState(false);
  return (
    <View>
      <Pressable role="button" aria-expanded={open} onPress={() => setOpen(!open)} style={styles.line}>
        <Text style={styles.words}>{label}</Text>
      </Pressable>
      {open ? children : null}
    </View>
  );
}

const styles = StyleSheet.create({
  line: { minHeight: 48, justifyContent: 'center' },
  words: {
    fontFamily: family.reading,
    fontSize: 15,
    color: roles.softInk,
    textDecorationLine: 'underline',
    ...webStyle({ textUnderlineOffset: 3 }),
  },
});
