import Svg, { G, Line, Path, Rect } from 'react-native-svg';
import { roles } from '@/components/theme/roles.ts';
import { coreWords } from '@/components/text/pierce.ts';
import { hatchData } from './hatch.tsx';

export type CoreProps = {
  /** Depth reached at each stage's end on a cold plate, as a share of the thickness. */
  bands: readonly number[];
  /** Routine time ÷ breakthrough; null when the pierce never gets through. */
  reserve: number | null;
  /** Width, px; the height is one and a half times that. */
  size: number;
  /** Beside words that already say the same the drawing is silent. */
  silent?: boolean;
};

/** Tail of a pierce whose reserve is 2: as long as the section is deep would be 3. */
const tailFor = (reserve: number, most: number) => Math.max(0, Math.min(1, (reserve - 1) / 1.5)) * most;

/**
 * The mark of a strategy: a small section of the plate, the stages of its pierce as bands down the bore, and the reserve as hatching that
 * runs out below. A pierce that never gets through stays closed and has no tail.
 */
export function Core({ bands, reserve, size, silent = false }: CoreProps) {
  const deep = size; // the section is square
  const most = size * 0.46;
  const bore = { x: size * 0.34, width: size * 0.32 };
  const shares = bandShares(bands);
  const through = reserve !== null && reserve > 0;
  const tail = through ? tailFor(reserve, most) : 0;
  const spacing = Math.max(3.5, size / 9);
  const label = coreWords(shares.length, reserve);
  return (
    <Svg
      width={size}
      height={deep + most}
      viewBox={`0 0 ${size} ${deep + most}`}
      {...(silent ? { 'aria-hidden': true } : { role: 'img', 'aria-label': label })}
    >
      <Rect x={0} y={0} width={size} height={deep} fill={roles.steelFill} />
      <Path
        d={
          hatchData(0, 0, bore.x, deep, spacing) +
          hatchData(bore.x + bore.width, 0, size - bore.x - bore.width, deep, spacing)
        }
        stroke={roles.steelLine}
        strokeWidth={1}
      />
      <G>
        <Rect x={bore.x} y={0} width={bore.width} height={deep} fill={roles.sheet} />
        {shares.map((band, index) => (
          <Rect
            key={band.to}
            testID="core-band"
            x={bore.x}
            y={band.from * deep}
            width={bore.width}
            height={(band.to - band.from) * deep}
            fill={roles.ember}
            fillOpacity={0.2 + (0.7 * (index + 1)) / shares.length}
          />
        ))}
        {shares.slice(0, -1).map((band) => (
          <Line
            key={band.to}
            x1={bore.x}
            x2={bore.x + bore.width}
            y1={band.to * deep}
            y2={band.to * deep}
            stroke={roles.sheet}
            strokeWidth={1.5}
          />
        ))}
      </G>
      <Path
        d={`M${bore.x} 0V${deep}M${bore.x + bore.width} 0V${deep}`}
        stroke={roles.ink}
        strokeWidth={Math.max(1, size / 44)}
      />
      <Path
        d={`M0.75 0.75H${bore.x}M${bore.x + bore.width} 0.75H${size - 0.75}M0.75 ${deep - 0.75}H${through ? bore.x : size - 0.75}M${
          bore.x + bore.width
        } ${deep - 0.75}H${size - 0.75}`}
        stroke={roles.ink}
        strokeWidth={Math.max(1.5, size / 32)}
      />
      {tail > 0 && (
        <Path
          testID="core-reserve"
          d={hatchData(bore.x, deep + 2, bore.width, tail, Math.max(3.5, size / 11))}
          stroke={roles.ember}
          strokeWidth={Math.max(1.25, size / 40)}
        />
      )}
    </Svg>
  );
}

/** Where each stage's band begins and ends, 0 the top to 1 the bottom; stages that add no depth have none. */
export function bandShares(bands: readonly number[]): { from: number; to: number }[] {
  const shares: { from: number; to: number }[] = [];
  let from = 0;
  for (const band of bands) {
    const to = Math.min(1, Math.max(from, Number.isFinite(band) ? band : from));
    // a band thinner than a hair would only be a smear
    if (to - from > 0.005) shares.push({ from, to });
    from = to;
  }
  return shares;
}
