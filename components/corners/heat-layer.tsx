import { useCallback, useLayoutEffect, useRef, useState } from 'react';
import { StyleSheet, View } from 'react-native';
import Svg, { G, Rect } from 'react-native-svg';
import type { DrawingSpace, DrawnSheet } from '@/components/parts/drawing-space.ts';
import { letteringWidth } from '@/components/pierce/section-layout.ts';
import { Lettering } from '@/components/pierce/still-shapes.tsx';
import { roles } from '@/components/theme/roles.ts';
import { useTheme } from '@/components/theme/theme.ts';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import type { Segment } from '@/strategy/path/index.ts';
import { quantityText } from '@/strategy/units/index.ts';
import { HeatCanvas, type HeatPicture } from './heat-canvas.web.tsx';
import { heatMoment, temperaturesOn, type PlateHeat } from './heat-field.ts';
import { heatLevels } from './heat-levels.ts';
import { levelLabels, type LevelLabel } from './heat-paint.ts';
import type { RunClock } from './run-clock.ts';

type HeatLayerProps = {
  heat: PlateHeat;
  clock: RunClock;
  space: DrawingSpace;
  sheet: DrawnSheet;
  /** Of the plate; beyond it there is nothing to be hot. */
  plate: readonly { readonly segments: readonly Segment[] }[];
  /** K */
  limit: number;
};

/** Size of a point of the picture while the time runs and once it rests, px, and what a picture has of them at most. */
const [running, resting, most] = [3, 1.5, 700_000];
/** After so long without a change the picture is drawn finer, with its figures, ms. */
const restTime = 140;

/**
 * The plate's temperature under the lines of the drawing. It has one picture a moment, moved and enlarged with the drawing; a new moment is drawn in the next
 * frame, coarse at first, and none of the page with it.
 */
export function HeatLayer({ heat, clock, space, sheet, plate, limit }: HeatLayerProps) {
  const { name: theme } = useTheme();
  const system = useUnitSystem();
  const picture = useRef<HeatPicture>(null);
  const [labels, setLabels] = useState<{ of: DrawnSheet; space: DrawingSpace; at: readonly PlacedLabel[] } | null>(
    null,
  );

  const draw = useCallback(
    (point: number): PlacedLabel[] => {
      const size = Math.max(point, Math.sqrt((sheet.width * sheet.height) / most));
      const columns = Math.max(1, Math.round(sheet.width / size));
      const rows = Math.max(1, Math.round(sheet.height / size));
      const [across, down] = [sheet.width / columns, sheet.height / rows];
      const origin = space.at({ x: 0, y: 0 });
      // the place of the first point's middle, m; rows run down
      const raster = {
        x: (across / 2 - sheet.x - origin.x) / space.scale,
        y: (origin.y + sheet.y - down / 2) / space.scale,
        dx: across / space.scale,
        dy: -down / space.scale,
        columns,
        rows,
      };
      const moment = heatMoment(heat, clock.time(), Math.max(5e-4, raster.dx / 2));
      if (!moment) return [];
      const temperatures = temperaturesOn(moment, raster);
      const levels = heatLevels(system);
      const clip = plate.map(({ segments }) => `${space.write(segments)}Z`).join('');
      picture.current?.paint(
        { temperatures, columns, rows, levels, limit },
        { data: clip, x: sheet.x / across, y: sheet.y / down, scaleX: space.zoom / across, scaleY: space.zoom / down },
      );
      if (point > resting) return [];
      // the frame is the sheet's middle half; figures keep off its edges
      const inset = 40 / across;
      const inside = {
        left: Math.round(columns / 4 + inset),
        right: Math.round((3 * columns) / 4 - inset),
        top: Math.round(rows / 4 + inset / 2),
        bottom: Math.round((3 * rows) / 4 - inset / 2),
      };
      return levelLabels(temperatures, columns, levels, inside, 70 / across).map(({ kelvin, column, row }) => ({
        kelvin,
        x: (column + 0.5) * across,
        y: (row + 0.5) * down,
      }));
    },
    [heat, clock, space, sheet, plate, limit, system],
  );

  // before the browser paints: what lies under the lines must have been drawn for the same window
  useLayoutEffect(() => {
    let frame: number | null = null;
    let timer: number | undefined;
    const rest = () => {
      window.clearTimeout(timer);
      timer = window.setTimeout(() => setLabels({ of: sheet, space, at: draw(resting) }), restTime);
    };
    const change = () => {
      setLabels(null);
      frame ??= requestAnimationFrame(() => {
        frame = null;
        draw(running);
        rest();
      });
    };
    draw(running);
    rest();
    const leave = clock.subscribe(change);
    return () => {
      leave();
      window.clearTimeout(timer);
      if (frame !== null) cancelAnimationFrame(frame);
    };
  }, [draw, clock, space, sheet, theme]);

  return (
    <>
      <HeatCanvas ref={picture} width={sheet.width} height={sheet.height} />
      {labels?.of === sheet && labels.space === space && (
        <View style={styles.labels}>
          <Svg width={sheet.width} height={sheet.height} aria-hidden>
            {labels.at.map(({ kelvin, x, y }) => (
              <Figure key={`${kelvin} ${x} ${y}`} x={x} y={y} text={quantityText(kelvin, 'temperature', system).text} />
            ))}
          </Svg>
        </View>
      )}
    </>
  );
}

type PlacedLabel = Pick<LevelLabel, 'kelvin'> & { readonly x: number; readonly y: number };

function Figure({ x, y, text }: { x: number; y: number; text: string }) {
  const width = letteringWidth(text) + 6;
  return (
    <G testID="heat-level" transform={`translate(${x} ${y})`}>
      <Rect x={-width / 2} y={-9} width={width} height={18} rx={2} fill={roles.sheet} fillOpacity={0.86} />
      <Lettering x={0} y={5} anchor="middle" figure>
        {text}
      </Lettering>
    </G>
  );
}

const styles = StyleSheet.create({ labels: { position: 'absolute', left: 0, top: 0 } });
