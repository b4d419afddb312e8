import { roles } from '@/components/theme/roles.ts';
import type { Treatment } from '@/shared/corner-plans.ts';

type BadgeShapeProps = { treatment: Treatment; trouble?: boolean; chosen?: boolean };

/**
 * A corner's treatment as a shape about (0, 0), 26 px across: a ring with an open arc for a loop, a square with two bars for a dwell, a
 * filled dot for a corner left alone. Trouble adds the caution's triangle, which nothing else may use.
 */
export function BadgeShape({ treatment, trouble = false, chosen = false }: BadgeShapeProps) {
  const edge = chosen ? roles.ember : roles.ink;
  const weight = chosen ? 3 : 1.8;
  return (
    <g>
      {treatment === 'loop' && (
        <>
          <circle r={11} fill={roles.sheet} stroke={edge} strokeWidth={weight} />
          <path d="M-3.5 5.5V1a4.6 4.6 0 1 1 7 0V5.5" fill="none" stroke={roles.ember} strokeWidth={2.2} />
        </>
      )}
      {treatment === 'dwell' && (
        <>
          <rect x={-10} y={-10} width={20} height={20} fill={roles.sheet} stroke={edge} strokeWidth={weight} />
          <path d="M-3.2 -5V5M3.2 -5V5" stroke={roles.ink} strokeWidth={2.6} />
        </>
      )}
      {treatment === 'leave' && (
        <>
          {chosen && <circle r={10} fill={roles.sheet} stroke={roles.ember} strokeWidth={weight} />}
          <circle r={4.6} fill={roles.ink} stroke={roles.sheet} strokeWidth={1.5} />
        </>
      )}
      {trouble && (
        <g transform="translate(10 -9)">
          <path d="M0 -8.5 8 6H-8Z" fill={roles.sheet} stroke={roles.hot} strokeWidth={2} strokeLinejoin="round" />
          <path d="M0 -3.5V1.4M0 3.2v1.4" stroke={roles.hot} strokeWidth={2} />
        </g>
      )}
    </g>
  );
}

/** The same in a list or a legend. */
export function TreatmentBadge({ size = 36, ...shape }: BadgeShapeProps & { size?: number }) {
  return (
    <svg width={size} height={size} viewBox="-18 -18 38 36" aria-hidden="true" style={{ flex: 'none' }}>
      <BadgeShape {...shape} />
    </svg>
  );
}
