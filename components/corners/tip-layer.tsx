import { useMemo } from 'react';
import { G, Rect } from 'react-native-svg';
import { markOff } from '@/components/parts/drawing-view.tsx';
import type { DrawingSpace, DrawnSheet } from '@/components/parts/drawing-space.ts';
import { letteringWidth } from '@/components/pierce/section-layout.ts';
import { Lettering } from '@/components/pierce/still-shapes.tsx';
import { roles } from '@/components/theme/roles.ts';
import { temperatureColour } from '@/components/theme/temperature.ts';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import type { PlannedCorner } from '@/shared/corner-plans.ts';
import { measuringDepth } from '@/strategy/heat/index.ts';
import type { Point } from '@/strategy/path/index.ts';
import { quantityText } from '@/strategy/units/index.ts';
import { badgeStretch } from './corner-inward.ts';
import { heatMoment, temperatureAt, type HeatMoment, type PlateHeat } from './heat-field.ts';
import { useRunTime, type RunClock } from './run-clock.ts';

type TipLayerProps = {
  corners: readonly PlannedCorner[];
  inward: ReadonlyMap<string, Point>;
  chosen: string | null;
  /** Null while none is known: then each tip shows what it returns at. */
  heat: PlateHeat | null;
  clock: RunClock;
  space: DrawingSpace;
  sheet: DrawnSheet;
  /** K */
  limit: number;
};

/** Of a whole plate the hottest alone have a figure; as many as this seen at once all have one. */
const [hottest, few] = [4, 14];
/** Which are the hottest is looked up again after so many s of the cut. */
const lookedUpEvery = 2;
/** What a tip's temperature is told to, m. */
const grain = 4e-4;
/** From the badge's middle to the figure's, across and up, px: beside it or above it there is room. */
const beside = { across: 48, up: 25 } as const;

/**
 * Temperatures at corners' tips: before the cut runs what each returns at as planned, while it runs what it is at that moment. The chosen one and the hottest, and
 * all where few are in view. A heavy frame returns over the limit: while it runs every tip is hotter for as long as the front is near.
 */
export function TipLayer({ corners, inward, chosen, heat, clock, space, sheet, limit }: TipLayerProps) {
  const time = useRunTime(clock);
  const system = useUnitSystem();
  const tips = useMemo(
    () =>
      corners.flatMap((corner): Tip[] => {
        const into = inward.get(corner.id);
        if (!into) return [];
        const { x, y } = corner.at;
        return [{ corner, into, at: { x: x + into.x * measuringDepth, y: y + into.y * measuringDepth } }];
      }),
    [corners, inward],
  );
  const inView = useMemo(
    () =>
      tips.filter(({ corner }) => {
        const at = space.at(corner.at);
        // the frame is the middle half of the sheet
        const [x, y] = [(at.x + sheet.x) / sheet.width, (at.y + sheet.y) / sheet.height];
        return x > 0.25 && x < 0.75 && y > 0.25 && y < 0.75;
      }),
    [tips, space, sheet],
  );
  const moment = useMemo(() => (heat && time > 0 ? heatMoment(heat, time, grain) : null), [heat, time]);
  const slot = Math.floor(time / lookedUpEvery);
  const ranked = useMemo(() => {
    const then = heat && slot > 0 ? heatMoment(heat, slot * lookedUpEvery, grain) : null;
    const hot = new Map(inView.map((tip) => [tip, kelvinOf(tip, then)]));
    return [...inView].sort((a, b) => (hot.get(b) ?? 0) - (hot.get(a) ?? 0));
  }, [inView, heat, slot]);
  const shown = inView.length <= few ? inView : ranked.slice(0, hottest);
  const own = tips.find(({ corner }) => corner.id === chosen);
  const all = own && !shown.includes(own) ? [own, ...shown] : shown;

  return (
    <>
      {apart(
        all.map((tip) =>
          labelOf(tip, kelvinOf(tip, moment), moment === null && tip.corner.treated > limit, space, system),
        ),
      ).map(({ id, x, y, text, width, kelvin, over }) => (
        <G key={id} testID="tip" transform={`translate(${x.toFixed(1)} ${y.toFixed(1)})`}>
          <Rect
            x={-width / 2}
            y={-11}
            width={width}
            height={22}
            rx={2}
            fill={roles.sheet}
            stroke={over ? roles.hot : roles.rule}
            strokeWidth={over ? 2.4 : 1}
          />
          <Rect
            x={-width / 2 + 4}
            y={-7}
            width={8}
            height={14}
            fill={temperatureColour(kelvin)}
            stroke={roles.ink}
            strokeWidth={0.8}
          />
          <Lettering x={7} y={5} anchor="middle" figure>
            {text}
          </Lettering>
        </G>
      ))}
    </>
  );
}

type Tip = { readonly corner: PlannedCorner; readonly into: Point; readonly at: Point };

const kelvinOf = ({ corner, at }: Tip, moment: HeatMoment | null): number =>
  moment ? temperatureAt(moment, at) : corner.treated;

type Label = { id: string; x: number; y: number; text: string; width: number; kelvin: number; over: boolean };

function labelOf(
  { corner, into }: Tip,
  kelvin: number,
  over: boolean,
  space: DrawingSpace,
  system: Parameters<typeof quantityText>[2],
): Label {
  const at = space.at(corner.at);
  const text = quantityText(kelvin, 'temperature', system, { decimals: 0 }).text;
  // along the bisector as far beyond the badge as one of the two asks for
  const beyond = Math.min(beside.across / Math.abs(into.x), beside.up / Math.abs(into.y));
  const off = markOff * badgeStretch(corner.angle) + beyond;
  return {
    id: corner.id,
    x: at.x + into.x * off,
    y: at.y - into.y * off,
    text,
    width: letteringWidth(text) + 26,
    kelvin,
    over,
  };
}

/** Those that don't lie on one before them. */
function apart(labels: readonly Label[]): Label[] {
  const placed: Label[] = [];
  for (const label of labels) {
    const free = placed.every(
      ({ x, y, width }) => Math.abs(x - label.x) > (width + label.width) / 2 + 2 || Math.abs(y - label.y) > 24,
    );
    if (free) placed.push(label);
  }
  return placed;
}
