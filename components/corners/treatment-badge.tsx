import Svg, { Circle, G, Path, Rect } from 'react-native-svg';
import { roles } from '@/components/theme/roles.ts';
import type { Treatment } from '@/shared/corner-plans.ts';

type BadgeShapeProps = { treatment: Treatment; trouble?: boolean; chosen?: boolean };

/**
 * A corner's treatment as a shape about (0, 0), 26 px across: a ring with an open arc for a loop, a square with two bars for a dwell, a
 * rhombus with a line that thins towards its middle for an ease, a square rounded on one corner with an arc in it for a round, a
 * filled dot for a corner left alone. Trouble adds the caution's triangle, which nothing else may use.
 */
export function BadgeShape({ treatment, trouble = false, chosen = false }: BadgeShapeProps) {
  const edge = chosen ? roles.ember : roles.ink;
  const weight = chosen ? 3 : 1.8;
  return (
    <G>
      {treatment === 'loop' && (
        <>
          <Circle r={11} fill={roles.sheet} stroke={edge} strokeWidth={weight} />
          <Path d="M-3.5 5.5V1a4.6 4.6 0 1 1 7 0V5.5" fill="none" stroke={roles.ember} strokeWidth={2.2} />
        </>
      )}
      {treatment === 'dwell' && (
        <>
          <Rect x={-10} y={-10} width={20} height={20} fill={roles.sheet} stroke={edge} strokeWidth={weight} />
          <Path d="M-3.2 -5V5M3.2 -5V5" stroke={roles.ink} strokeWidth={2.6} />
        </>
      )}
      {treatment === 'ease' && (
        <>
          <Path d="M0 -12 12 0 0 12 -12 0Z" fill={roles.sheet} stroke={edge} strokeWidth={weight} />
          <Path d="M-7 -2.6 0 -0.5 7 -2.6V2.6L0 0.5 -7 2.6Z" fill={roles.ink} />
        </>
      )}
      {treatment === 'round' && (
        <>
          <Path d="M-10 10V-10H-2A12 12 0 0 1 10 2V10Z" fill={roles.sheet} stroke={edge} strokeWidth={weight} />
          <Path d="M-5 -4A9 9 0 0 1 4 5" fill="none" stroke={roles.ink} strokeWidth={2.6} />
        </>
      )}
      {treatment === 'leave' && (
        <>
          {chosen && <Circle r={10} fill={roles.sheet} stroke={roles.ember} strokeWidth={weight} />}
          <Circle r={4.6} fill={roles.ink} stroke={roles.sheet} strokeWidth={1.5} />
        </>
      )}
      {trouble && (
        <G transform="translate(10 -9)">
          <Path d="M0 -8.5 8 6H-8Z" fill={roles.sheet} stroke={roles.hot} strokeWidth={2} strokeLinejoin="round" />
          <Path d="M0 -3.5V1.4M0 3.2v1.4" stroke={roles.hot} strokeWidth={2} />
        </G>
      )}
    </G>
  );
}

/** The same in a list or a legend. */
export function TreatmentBadge({ size = 36, ...shape }: BadgeShapeProps & { size?: number }) {
  return (
    <Svg width={size} height={size} viewBox="-18 -18 38 36" aria-hidden style={{ flexShrink: 0 }}>
      <BadgeShape {...shape} />
    </Svg>
  );
}
