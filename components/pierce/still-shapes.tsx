import { memo } from 'react';
import {
  Circle as AnyCircle,
  Line as AnyLine,
  Path as AnyPath,
  Rect as AnyRect,
  Text as AnyText,
} from 'react-native-svg';
import { roles } from '@/components/theme/roles.ts';
import { family } from '@/components/theme/type.ts';

// A drag draws the section anew in every frame and moves little of it: a shape whose numbers stay as they were is left alone.
export const Circle = memo(AnyCircle);
export const Line = memo(AnyLine);
export const Path = memo(AnyPath);
export const Rect = memo(AnyRect);

type LetteringProps = {
  x: number;
  y: number;
  children: string;
  anchor?: 'start' | 'middle' | 'end';
  /** Set as a number. */
  figure?: boolean;
  size?: number;
  colour?: string;
  transform?: string;
};

/** Words and figures of the drawing. */
export const Lettering = memo(function Lettering({
  x,
  y,
  children,
  anchor = 'start',
  figure = false,
  size = 14,
  colour = roles.ink,
  transform,
}: LetteringProps) {
  return (
    <AnyText
      x={x}
      y={y}
      transform={transform}
      textAnchor={anchor}
      fontFamily={figure ? family.figure : family.label}
      fontSize={size}
      fill={colour}
    >
      {children}
    </AnyText>
  );
});
