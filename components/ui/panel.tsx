import type { ReactNode } from 'react';
import { View } from 'react-native';
import { roles } from '@/components/theme/roles.ts';
import { line, space } from '@/components/theme/space.ts';
import { Heading } from './text.tsx';

/** A sheet of paper on the ground. */
export function Panel({
  children,
  title,
  level = 2,
  flush = false,
}: {
  readonly children: ReactNode;
  readonly title?: string;
  readonly level?: 2 | 3;
  /** The content reaches the edges (drawings, lists). */
  readonly flush?: boolean;
}) {
  return (
    <View
      style={{
        backgroundColor: roles.sheet,
        borderWidth: line.thin,
        borderColor: roles.rule,
        borderRadius: line.corner,
        padding: flush ? 0 : space.l,
        gap: space.m,
      }}
    >
      {title === undefined ? null : <Heading level={level}>{title}</Heading>}
      {children}
    </View>
  );
}
