import type { ReactNode } from 'react';
import { View } from 'react-native';
import { roles } from '@/components/theme/roles.ts';
import { space } from '@/components/theme/space.ts';
import { Body, Heading } from './text.tsx';

/** A list with nothing in it: what would stand here, and how it comes here. */
export function Empty({
  title,
  children,
  action,
}: {
  readonly title: string;
  readonly children?: ReactNode;
  readonly action?: ReactNode;
}) {
  return (
    <View
      style={{
        alignItems: 'flex-start',
        gap: space.m,
        padding: space.xl,
        borderWidth: 1,
        borderStyle: 'dashed',
        borderColor: roles.steelLine,
        borderRadius: 3,
      }}
    >
      <Heading level={2}>{title}</Heading>
      {typeof children === 'string' ? <Body tone="softInk">{children}</Body> : children}
      {action}
    </View>
  );
}
