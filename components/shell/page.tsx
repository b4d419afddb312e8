import type { ReactNode } from 'react';
import { View } from 'react-native';
import { useLayout } from '@/components/theme/layout.ts';
import { space } from '@/components/theme/space.ts';
import { EstimateNote } from '@/components/ui/estimate-note.tsx';
import { Heading, Label } from '@/components/ui/text.tsx';

/**
 * A page: what it is of, its name, its actions, its content. On a wide screen `aside` is a second pane on the right; on a phone
 * it follows below. `measure` keeps forms and words at a readable width.
 */
export function Page({
  title,
  eyebrow,
  actions,
  aside,
  children,
  measure = 'full',
  asideFirst = false,
  estimates = false,
}: {
  readonly title?: string;
  /** A small line above the name. */
  readonly eyebrow?: string;
  readonly actions?: ReactNode;
  readonly aside?: ReactNode;
  readonly children: ReactNode;
  readonly measure?: 'full' | 'reading';
  /** On a phone the second pane comes above, for what would be lost below a long list. */
  readonly asideFirst?: boolean;
  /** There are numbers on it: the caution stands below them. */
  readonly estimates?: boolean;
}) {
  const { wide } = useLayout();
  const first = (
    <View key="first" style={{ flexGrow: 1, flexShrink: 1, flexBasis: wide ? 0 : 'auto', minWidth: 0, gap: space.l }}>
      {children}
    </View>
  );
  const second = (
    <View key="second" style={{ width: wide ? 380 : '100%', gap: space.l }}>
      {aside}
    </View>
  );
  return (
    <View
      style={{
        width: '100%',
        maxWidth: measure === 'reading' ? 820 : 1720,
        paddingHorizontal: wide ? space.xl : space.l,
        paddingTop: wide ? space.xl : space.m,
        paddingBottom: space.xxl,
        gap: space.l,
      }}
    >
      {title === undefined && actions === undefined ? null : (
        <View
          style={{
            flexDirection: 'row',
            flexWrap: 'wrap',
            alignItems: 'flex-end',
            justifyContent: 'space-between',
            columnGap: space.l,
            rowGap: space.m,
          }}
        >
          <View style={{ flexGrow: 1, flexShrink: 1, flexBasis: 240, minWidth: 0 }}>
            {eyebrow === undefined ? null : <Label>{eyebrow}</Label>}
            {title === undefined ? null : <Heading level={1}>{title}</Heading>}
          </View>
          {actions === undefined ? null : (
            <View style={{ flexDirection: 'row', flexWrap: 'wrap', gap: space.s }}>{actions}</View>
          )}
        </View>
      )}
      {aside === undefined ? (
        children
      ) : (
        <View style={{ flexDirection: wide ? 'row' : 'column', gap: wide ? space.xl : space.l, alignItems: 'stretch' }}>
          {/* in the order in which they are read, with keys so that turning a tablet begins nothing afresh */}
          {asideFirst && !wide ? [second, first] : [first, second]}
        </View>
      )}
      {estimates ? <EstimateNote /> : null}
    </View>
  );
}
