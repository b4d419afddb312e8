import Svg, { Path } from 'react-native-svg';
import { roles } from '@/components/theme/roles.ts';
import type { Role } from '@/components/theme/tokens.ts';

/** Small drawn signs, told apart by shape. They take the colour of the text around them and say nothing by themselves. */
const drawings = {
  /** The caution owns the triangle. */
  caution: 'M12 3 22 20.5H2ZM12 9.5v5M12 16.6v1.6',
  wrong: 'M4 4H20V20H4ZM8.5 8.5l7 7M15.5 8.5l-7 7',
  ok: 'M4 12.5 9.5 18 20.5 5.5',
  plain: 'M4 12H20',
  menu: 'M3 6H21M3 12H21M3 18H21',
  close: 'M5 5 19 19M19 5 5 19',
  forward: 'M9 4.5 16.5 12 9 19.5',
  back: 'M15 4.5 7.5 12 15 19.5',
  down: 'M4.5 9 12 16.5 19.5 9',
  plus: 'M12 4V20M4 12H20',
  picture: 'M3 6H8L10 3.5H14L16 6H21V19.5H3ZM12 9a3.7 3.7 0 1 0 .01 0Z',
  file: 'M5 2.5H14L19 7.5V21.5H5ZM14 2.5V7.5H19',
  search: 'M10.5 4a6.5 6.5 0 1 0 .01 0ZM15.2 15.2 21 21',
} as const;

export type MarkName = keyof typeof drawings;

/** `tone` is its colour where it differs from the text around it. */
export function Mark({
  name,
  size = 24,
  tone,
}: {
  readonly name: MarkName;
  readonly size?: number;
  readonly tone?: Role;
}) {
  return (
    <Svg
      width={size}
      height={size}
      viewBox="0 0 24 24"
      fill="none"
      stroke={tone === undefined ? 'currentColor' : roles[tone]}
      strokeWidth={2}
      aria-hidden
      style={{ flexShrink: 0 }}
    >
      <Path d={drawings[name]} />
    </Svg>
  );
}
