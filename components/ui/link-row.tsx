import type { Href } from 'expo-router';
import type { ReactNode } from 'react';
import { View } from 'react-native';
import { roles } from '@/components/theme/roles.ts';
import { space } from '@/components/theme/space.ts';
import { PlainLink } from './link.tsx';
import { Mark } from './mark.tsx';

/** A row of a list that opens something; at least 56 px high. `left` is its picture (a core), `right` a figure. */
export function LinkRow({
  href,
  children,
  left,
  right,
  spoken,
}: {
  readonly href: Href;
  readonly children: ReactNode;
  readonly left?: ReactNode;
  readonly right?: ReactNode;
  /** Name of the link when its content reads badly aloud. */
  readonly spoken?: string;
}) {
  return (
    <PlainLink href={href} look="row" spoken={spoken} style={{ flexDirection: 'row', width: '100%' }}>
      <View
        style={{
          flex: 1,
          minWidth: 0,
          flexDirection: 'row',
          alignItems: 'center',
          gap: space.m,
          minHeight: 56,
          paddingVertical: space.m,
          paddingHorizontal: space.xs,
        }}
      >
        {left}
        <View style={{ flex: 1, minWidth: 0, gap: 2 }}>{children}</View>
        {right}
        <Mark name="forward" size={18} tone="softInk" />
      </View>
    </PlainLink>
  );
}

/** A list of rows with a rule between them. */
export function Rows({ children, label }: { readonly children: readonly ReactNode[]; readonly label: string }) {
  return (
    <View role="list" aria-label={label} style={{ borderTopWidth: 1, borderTopColor: roles.ink }}>
      {children.map((child, index) => (
        // Rows keep the keys of their own children; the place in the list is theirs alone.
        <View
          key={keyOf(child) ?? index}
          role="listitem"
          style={{ borderBottomWidth: 1, borderBottomColor: roles.rule }}
        >
          {child}
        </View>
      ))}
    </View>
  );
}

function keyOf(child: ReactNode): string | null {
  return typeof child === 'object' && child !== null && 'key' in child ? child.key : null;
}
