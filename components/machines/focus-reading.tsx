import { View } from 'react-native';
import Svg, { Defs, G, Path, Pattern, Rect, Text as SvgText } from 'react-native-svg';
import { profileText } from '@/components/text/machines.ts';
import { roles } from '@/components/theme/roles.ts';
import { family } from '@/components/theme/type.ts';
import { Notice } from '@/components/ui/notice.tsx';
import { Stack } from '@/components/ui/stack.tsx';
import { Body, Heading, Small } from '@/components/ui/text.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import { dialForFocus, focusForDial } from '@/strategy/beam/index.ts';
import type { FocusScale } from '@/strategy/machine.ts';
import { quantityText, type UnitSystem } from '@/strategy/units/index.ts';

const mm = 1e-3;
const { focusScale: text } = profileText;

/** The position of the example, and those on the drawing, m above the plate's top. */
const example = 5 * mm;
const ladder = [10, 7.5, 5, 2.5, 0, -2.5, -5, -7.5, -10].map((value) => value * mm);
/** A dial counted from the nozzle tip needs a standoff: this one, m, for the example. */
const standoff = 10 * mm;

/** What a focus scale means in numbers: a sentence each way, and a ladder of positions with the number to type. */
export function FocusReading({ scale }: { readonly scale: FocusScale }) {
  const system = useUnitSystem();
  const typed = dialForFocus(scale, example, standoff);
  return (
    <View aria-live="polite">
      <Stack>
        <Heading level={3}>{text.example}</Heading>
        {typed.kind === 'ok' ? (
          <Body strong>{text.toHave(signed(example, system), dialText(typed.typed))}</Body>
        ) : (
          <Notice kind="caution">{typed.why}</Notice>
        )}
        <Body>{text.typing(dialText(1 * mm), signed(focusForDial(scale, 1 * mm, standoff), system))}</Body>
        {scale.slope < 0 ? <Body>{text.reversed}</Body> : null}
        {scale.reference === 'nozzle' ? (
          <Small>{text.atStandoff(quantityText(standoff, 'length', system).text)}</Small>
        ) : null}
        <FocusLadder scale={scale} system={system} />
      </Stack>
    </View>
  );
}

/** The plate in section with focus positions above and inside it, and what to type for each. */
function FocusLadder({ scale, system }: { readonly scale: FocusScale; readonly system: UnitSystem }) {
  const step = 26;
  const top = 30;
  const height = top + ladder.length * step + 6;
  const plateTop = top + ladder.indexOf(0) * step + step / 2;
  const rows = ladder.map((position, index) => ({
    position,
    y: top + index * step + step / 2,
    typed: dialForFocus(scale, position, standoff),
  }));
  return (
    <Svg
      viewBox={`0 0 320 ${height}`}
      role="img"
      aria-label={`${text.drawing}: ${rows
        .map(
          (row) =>
            `${signed(row.position, system)}: ${row.typed.kind === 'ok' ? dialText(row.typed.typed) : text.outOfReach}`,
        )
        .join('; ')}`}
      style={{ width: '100%', maxWidth: 360 }}
    >
      <Defs>
        <Pattern id="focus-steel" width="9" height="9" patternUnits="userSpaceOnUse" patternTransform="rotate(45)">
          <Path d="M0 0V9" stroke={roles.steelLine} strokeWidth={1} />
        </Pattern>
      </Defs>
      <Rect x={96} y={plateTop} width={128} height={height - plateTop} fill={roles.steelFill} />
      <Rect x={96} y={plateTop} width={128} height={height - plateTop} fill="url(#focus-steel)" />
      <Path
        d={`M96 ${plateTop}H224M96 ${plateTop}V${height}M224 ${plateTop}V${height}`}
        stroke={roles.ink}
        strokeWidth={2}
      />
      {/* the beam's two edges, drawn through the example's waist */}
      <Path
        d={beam(rows.find((row) => row.position === example)?.y ?? plateTop, height)}
        fill={roles.ember}
        fillOpacity={0.14}
        stroke={roles.ember}
        strokeWidth={1.5}
      />
      <G fontFamily={family.label} fontSize={14} fill={roles.softInk}>
        <SvgText x={86} y={18} textAnchor="end">
          {text.position}
        </SvgText>
        <SvgText x={234} y={18}>
          {text.type}
        </SvgText>
      </G>
      <G fontFamily={family.figure} fontSize={17}>
        {rows.map((row) => (
          <G key={row.position} fill={row.position === example ? roles.ember : roles.ink}>
            <Path
              d={`M92 ${row.y}H102M218 ${row.y}H228`}
              stroke={row.position === example ? roles.ember : roles.ink}
              strokeWidth={1.2}
            />
            <SvgText x={86} y={row.y + 6} textAnchor="end">
              {signed(row.position, system)}
            </SvgText>
            {row.typed.kind === 'ok' ? (
              <SvgText x={234} y={row.y + 6}>
                {dialText(row.typed.typed)}
              </SvgText>
            ) : (
              <SvgText x={234} y={row.y + 5} fill={roles.softInk} fontFamily={family.label} fontSize={14}>
                {text.outOfReach}
              </SvgText>
            )}
          </G>
        ))}
      </G>
    </Svg>
  );
}

/** A converging and diverging beam with its waist at a height of the drawing. */
const beam = (waist: number, height: number): string =>
  `M132 24Q157 ${waist - 20} 157 ${waist}Q157 ${waist + 20} 132 ${Math.min(height - 4, waist + 110)}H188Q163 ${waist + 20} 163 ${waist}Q163 ${waist - 20} 188 24Z`;

const signed = (position: number, system: UnitSystem): string =>
  quantityText(position, 'length', system, { sign: true }).text;

/** A number as typed at the machine: millimetres without the unit, since the dial shows none. */
const dialText = (typed: number): string =>
  quantityText(typed, 'length', 'metric', { unit: 'mm', decimals: 2, sign: true }).number;
