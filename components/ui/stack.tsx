import type { ReactNode } from 'react';
import { View, type FlexAlignType, type ViewStyle } from 'react-native';
import { space } from '@/components/theme/space.ts';

type Gap = keyof typeof space;

type LineProps = {
  readonly children: ReactNode;
  readonly gap?: Gap;
  readonly align?: FlexAlignType;
  readonly justify?: ViewStyle['justifyContent'];
  readonly grow?: boolean;
};

/** Things below each other. */
export function Stack({ children, gap = 'm', align, justify, grow = false }: LineProps) {
  return (
    <View
      style={{ gap: space[gap], alignItems: align, justifyContent: justify, ...(grow ? { flex: 1, minWidth: 0 } : {}) }}
    >
      {children}
    </View>
  );
}

/** Things beside each other; they wrap where the page is narrow unless told otherwise. */
export function Row({
  children,
  gap = 'm',
  align = 'center',
  justify,
  grow = false,
  wrap = true,
}: LineProps & { readonly wrap?: boolean }) {
  return (
    <View
      style={{
        flexDirection: 'row',
        flexWrap: wrap ? 'wrap' : 'nowrap',
        gap: space[gap],
        alignItems: align,
        justifyContent: justify,
        ...(grow ? { flex: 1, minWidth: 0 } : {}),
      }}
    >
      {children}
    </View>
  );
}

/** Takes the room that is left in a row, down to a least width, px, below which the row wraps. */
export function Cell({
  children,
  least = 0,
  grow = 1,
}: {
  readonly children: ReactNode;
  readonly least?: number;
  readonly grow?: number;
}) {
  return <View style={{ flexGrow: grow, flexShrink: 1, flexBasis: least, minWidth: 0 }}>{children}</View>;
}
