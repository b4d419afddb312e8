import { useCallback, useLayoutEffect, useRef } from 'react';
import { G, Rect } from 'react-native-svg';
import { pathsBox } from '@/components/parts/drawing-geometry.ts';
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
import { useHeatLabels, type HeatLabels, type PlacedLabel } from './heat-labels.ts';
import { levelLabels } from './heat-paint.ts';
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
  /** Where the figures of its lines are handed to. */
  labels: HeatLabels;
};

/** Size of a point of the picture while the time runs and once it rests, px, and what a picture has of them at most. */
const [running, resting, most] = [3, 1.5, 700_000];
/** Share of the sheet on each side that is left out while the time runs. */
const runningMargin = 0.2;
/** After so long without a change the picture is drawn finer, with its figures, ms. */
const restTime = 140;

/**
 * The plate's temperature under the lines of the drawing. It has one picture a moment, moved and enlarged with the drawing; a new moment is drawn in the next
 * frame, coarse at first, and none of the page with it.
 */
export function HeatLayer({ heat, clock, space, sheet, plate, limit, labels }: HeatLayerProps) {
  const { name: theme } = useTheme();
  const system = useUnitSystem();
  const picture = useRef<HeatPicture>(null);

  const draw = useCallback(
    (point: number): PlacedLabel[] => {
      const size = Math.max(point, Math.sqrt((sheet.width * sheet.height) / most));
      const columns = Math.max(1, Math.round(sheet.width / size));
      const rows = Math.max(1, Math.round(sheet.height / size));
      const [across, down] = [sheet.width / columns, sheet.height / rows];
      // while the time runs little more than the frame, which is the sheet's middle half
      const margin = point > resting ? runningMargin : 0;
      const [skipped, above] = [Math.round(columns * margin), Math.round(rows * margin)];
      const origin = space.at({ x: 0, y: 0 });
      // the place of the first point's middle, m; rows run down
      const raster = {
        x: ((skipped + 0.5) * across - sheet.x - origin.x) / space.scale,
        y: (origin.y + sheet.y - (above + 0.5) * down) / space.scale,
        dx: across / space.scale,
        dy: -down / space.scale,
        columns: columns - 2 * skipped,
        rows: rows - 2 * above,
      };
      const moment = heatMoment(heat, clock.time(), Math.max(5e-4, raster.dx / 2));
      if (!moment) return [];
      const temperatures = temperaturesOn(moment, raster);
      const levels = heatLevels(system);
      const clip = plate.map(({ segments }) => `${space.write(segments)}Z`).join('');
      picture.current?.paint(
        { temperatures, columns, rows, skipped, above, levels, limit },
        { data: clip, x: sheet.x / across, y: sheet.y / down, scaleX: space.zoom / across, scaleY: space.zoom / down },
      );
      if (point > resting) return [];
      // the frame is the sheet's middle half; figures keep off its edges and the plate's
      const edge = pathsBox(plate);
      const [low, high] = [space.at({ x: edge.minX, y: edge.minY }), space.at({ x: edge.maxX, y: edge.maxY })];
      const inside = {
        left: Math.round(Math.max(sheet.width / 4, low.x + sheet.x) / across + 24 / across),
        right: Math.round(Math.min((3 * sheet.width) / 4, high.x + sheet.x) / across - 24 / across),
        top: Math.round(Math.max(sheet.height / 4, high.y + sheet.y) / down + 12 / down),
        bottom: Math.round(Math.min((3 * sheet.height) / 4, low.y + sheet.y) / down - 12 / down),
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
      timer = window.setTimeout(() => labels.set({ of: sheet, at: draw(resting) }), restTime);
    };
    const change = () => {
      labels.set(null);
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
      labels.set(null);
      window.clearTimeout(timer);
      if (frame !== null) cancelAnimationFrame(frame);
    };
  }, [draw, clock, labels, sheet, theme]);

  return <HeatCanvas ref={picture} width={sheet.width} height={sheet.height} />;
}

/** The figures of the picture's lines, over all other lines. */
export function HeatFigures({ labels, sheet }: { labels: HeatLabels; sheet: DrawnSheet }) {
  const system = useUnitSystem();
  const placed = useHeatLabels(labels);
  if (placed?.of !== sheet) return null;
  return (
    <>
      {placed.at.map(({ kelvin, x, y }) => (
        <Figure
          key={`${kelvin} ${x} ${y}`}
          x={x - sheet.x}
          y={y - sheet.y}
          text={quantityText(kelvin, 'temperature', system).text}
        />
      ))}
    </>
  );
}

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
