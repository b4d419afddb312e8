import { memo } from 'react';
import { Line, Pattern } from 'react-native-svg';

/** Centre line of the drawing office: long, short, short, short. */
export const centreLine = '14 4 3 4 3 4 3 4';

/**
 * SVG path of 45° section lines across a rectangle, `spacing` apart along its edges; rising to the right, or falling. Drawn line by
 * line, without a pattern, so that any number of small sections on a page need no ids.
 */
export function hatchData(x: number, y: number, width: number, height: number, spacing: number, falling = false) {
  const lines: string[] = [];
  // each line is u + v = k in a frame whose v runs down for rising lines and up for falling ones
  for (let k = spacing / 2; k < width + height; k += spacing) {
    const u0 = Math.max(0, k - height);
    const u1 = Math.min(width, k);
    if (u1 - u0 < 0.01) continue;
    const at = (u: number) => {
      const v = falling ? height - (k - u) : k - u;
      return `${round(x + u)} ${round(y + v)}`;
    };
    lines.push(`M${at(u0)}L${at(u1)}`);
  }
  return lines.join('');
}

const round = (value: number) => Math.round(value * 100) / 100;

type HatchProps = { id: string; spacing: number; colour: string; weight?: number; falling?: boolean; scale?: number };

/** Section lines as a fill for any outline: `fill="url(#id)"`. `scale` undoes an outline's own enlargement. */
export const HatchPattern = memo(function HatchPattern({
  id,
  spacing,
  colour,
  weight = 1,
  falling = false,
  scale = 1,
}: HatchProps) {
  const turn = falling ? -45 : 45;
  return (
    <Pattern
      id={id}
      width={spacing}
      height={spacing}
      patternUnits="userSpaceOnUse"
      patternTransform={`scale(${scale}) rotate(${turn})`}
    >
      <Line x1={spacing / 2} y1={0} x2={spacing / 2} y2={spacing} stroke={colour} strokeWidth={weight} />
    </Pattern>
  );
});
