import type { ReactNode } from 'react';
import { View } from 'react-native';
import { roles } from '@/components/theme/roles.ts';
import { space } from '@/components/theme/space.ts';
import type { TextRole } from './text.tsx';
import { Mark } from './mark.tsx';
import { Body } from './text.tsx';

export type NoticeKind = 'caution' | 'wrong' | 'ok' | 'plain';

const tone: Record<NoticeKind, TextRole> = { caution: 'hot', wrong: 'wrong', ok: 'good', plain: 'softInk' };

/** Words that must be seen: told apart by sign and frame first. `live` announces it when it appears. */
export function Notice({
  kind,
  title,
  children,
  live = false,
  large = false,
}: {
  readonly kind: NoticeKind;
  readonly title?: string;
  readonly children?: ReactNode;
  readonly live?: boolean;
  readonly large?: boolean;
}) {
  return (
    <View
      role={live ? (kind === 'wrong' ? 'alert' : 'status') : undefined}
      style={{
        flexDirection: 'row',
        gap: space.m,
        padding: space.m,
        borderWidth: kind === 'plain' ? 1 : 2,
        borderStyle: kind === 'plain' ? 'dashed' : 'solid',
        borderColor: roles[tone[kind]],
        borderRadius: 3,
        backgroundColor: roles.sheet,
      }}
    >
      <View style={{ paddingTop: 1 }}>
        <Mark name={kind} tone={tone[kind]} />
      </View>
      <View style={{ flex: 1, minWidth: 0, gap: space.xs }}>
        {title === undefined ? null : (
          <Body strong large={large}>
            {title}
          </Body>
        )}
        {typeof children === 'string' ? <Body large={large}>{children}</Body> : children}
      </View>
    </View>
  );
}
