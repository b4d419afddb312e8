import { Circle, G, Path } from 'react-native-svg';
import type { DrawingSpace } from '@/components/parts/drawing-space.ts';
import type { Snap } from '@/components/parts/measure.ts';
import { roles } from '@/components/theme/roles.ts';
import type { Point } from '@/strategy/path/index.ts';

/** The measured stretch as a dimension line with oblique ticks; the way across and up dashed beside it. */
export function MeasureLayer({ space, places }: { space: DrawingSpace; places: readonly Snap[] }) {
  const [first, second] = places;
  if (!first) return null;
  const a = space.at(first.at);
  const b = second ? space.at(second.at) : null;
  return (
    <G testID="measure">
      {b && (
        <>
          <Path
            d={`M${a.x} ${a.y}H${b.x}V${b.y}`}
            fill="none"
            stroke={roles.cold}
            strokeWidth={1.4}
            strokeDasharray="6 4"
          />
          <Path d={`M${a.x} ${a.y}L${b.x} ${b.y}`} stroke={roles.sheet} strokeWidth={6} />
          <Path d={`M${a.x} ${a.y}L${b.x} ${b.y}`} stroke={roles.cold} strokeWidth={2.4} />
          <Path d={tick(a) + tick(b)} stroke={roles.cold} strokeWidth={2.4} />
        </>
      )}
      <Place at={a} snapped={first.kind !== 'free'} />
      {b && second && <Place at={b} snapped={second.kind !== 'free'} />}
    </G>
  );
}

const tick = ({ x, y }: Point) => `M${x - 8} ${y + 8}L${x + 8} ${y - 8}`;

/** A ring around what was caught, a cross where nothing was. */
function Place({ at: { x, y }, snapped }: { at: Point; snapped: boolean }) {
  return snapped ? (
    <Circle cx={x} cy={y} r={7} fill="none" stroke={roles.cold} strokeWidth={2.4} />
  ) : (
    <Path d={`M${x - 7} ${y}H${x + 7}M${x} ${y - 7}V${y + 7}`} stroke={roles.cold} strokeWidth={2.4} />
  );
}
