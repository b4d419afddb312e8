import { useId } from 'react';
import { StyleSheet, Text, View } from 'react-native';
import { roles } from '@/components/theme/roles.ts';
import { family } from '@/components/theme/type.ts';

/** Something is going on: how far (0..1), or that it goes on at all when that is not known. */
export function Progress({ label, value }: { readonly label: string; readonly value?: number }) {
  const id = useId();
  return (
    <View role="status" style={{ gap: 6 }}>
      <Text id={id} style={styles.label}>
        {label}
      </Text>
      <View
        role="progressbar"
        aria-labelledby={id}
        aria-valuemin={0}
        aria-valuemax={100}
        aria-valuenow={value === undefined ? undefined : Math.round(value * 100)}
        style={styles.track}
      >
        <View
          dataSet={{ look: value === undefined ? 'running' : undefined }}
          style={[styles.bar, { width: value === undefined ? '33%' : `${value * 100}%` }]}
        />
      </View>
    </View>
  );
}

const styles = StyleSheet.create({
  label: { fontFamily: family.reading, fontSize: 15, lineHeight: 20, color: roles.softInk },
  track: { height: 4, backgroundColor: roles.rule, overflow: 'hidden' },
  bar: { height: 4, backgroundColor: roles.ink },
});
