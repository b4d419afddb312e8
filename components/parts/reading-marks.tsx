import type { ReactNode } from 'react';
import Svg, { Circle, G, Path } from 'react-native-svg';
import { roles } from '@/components/theme/roles.ts';
import type { DrawingReadingWire } from '@/shared/parts.ts';
import type { DrawingMark, DrawnTrace } from './drawing-view.tsx';

/** What a mark on a reading stands for; told apart by shape. */
export type ReadingMarkKind = 'crossing' | 'gap' | 'repaired' | 'leftOut' | 'branch';

const shapes: Readonly<Record<ReadingMarkKind, ReactNode>> = {
  crossing: <Path d="M-8 -8 8 8M-8 8 8 -8" fill="none" stroke={roles.wrong} strokeWidth={2.6} />,
  gap: <Circle r={9} fill="none" stroke={roles.hot} strokeWidth={2.4} />,
  repaired: <Path d="M0 -9 9 0 0 9 -9 0Z" fill={roles.sheet} stroke={roles.ember} strokeWidth={2.2} />,
  leftOut: <Path d="M-7 -7H7V7H-7Z" fill="none" stroke={roles.softInk} strokeWidth={2} strokeDasharray="3 2.5" />,
  branch: <Path d="M0 0V9M0 0 -8 -6M0 0 8 -6" fill="none" stroke={roles.softInk} strokeWidth={2.2} />,
};

/** A mark as it stands in a list, of the same shape as on the drawing. */
export function ReadingMark({ kind }: { kind: ReadingMarkKind }) {
  return (
    <Svg width={24} height={24} aria-hidden>
      <G transform="translate(12 12)">{shapes[kind]}</G>
    </Svg>
  );
}

/** Marks at the places of everything that was noted while reading; what keeps the part from being kept comes first. */
export function readingMarks(reading: DrawingReadingWire): DrawingMark[] {
  const gaps = reading.questions.flatMap((question) => (question.kind === 'gaps' ? question.gaps : []));
  const marks = (kind: ReadingMarkKind, weight: number, places: readonly DrawingMark['at'][]): DrawingMark[] =>
    places.map((at, index) => ({ id: `${kind} ${index}`, at, weight, draw: shapes[kind] }));
  return [
    ...marks('crossing', 4, reading.crossings),
    ...marks(
      'gap',
      3,
      gaps.map(({ at }) => at),
    ),
    ...marks(
      'repaired',
      2,
      reading.repaired.flatMap(({ at }) => at),
    ),
    ...marks('branch', 1, reading.branches),
    ...marks(
      'leftOut',
      0,
      reading.leftOut.flatMap(({ at }) => at),
    ),
  ];
}

/** Geometry that was not taken, as thin dotted lines. */
export const asideTraces = (
  reading: DrawingReadingWire,
): { id: string; kind: DrawnTrace; segments: DrawingReadingWire['aside'][number]['segments'] }[] =>
  reading.aside.map(({ segments }, index) => ({ id: `aside ${index}`, kind: 'way', segments }));
