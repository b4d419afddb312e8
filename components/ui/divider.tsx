import { View } from 'react-native';
import { roles } from '@/components/theme/roles.ts';

/** A line between things; `strong` in ink, as between parts of a sheet. */
export function Divider({ strong = false }: { readonly strong?: boolean }) {
  return <View role="separator" style={{ height: 1, backgroundColor: strong ? roles.ink : roles.rule }} />;
}
