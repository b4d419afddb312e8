import { useId, useMemo, useRef, type ReactNode } from 'react';
import { StyleSheet, View } from 'react-native';
import Svg, { Circle, Defs, G, Path, Rect } from 'react-native-svg';
import { centreLine, HatchPattern } from '@/components/pierce/hatch.tsx';
import { drawingText } from '@/components/text/parts.ts';
import { roles } from '@/components/theme/roles.ts';
import { line } from '@/components/theme/space.ts';
import { Button } from '@/components/ui/button.tsx';
import type { Box, Point, Segment } from '@/strategy/path/index.ts';
import { boxUnion, svgPathData } from '@/strategy/path/index.ts';
import { contourCircle, pathsBox } from './drawing-geometry.ts';
import { markNearest, marksSpread } from './drawing-marks.ts';
import { usePanZoom } from './use-pan-zoom.ts';
import { useWidth } from './use-width.ts';
import { windowToFrame, type ViewWindow } from './view-window.ts';

/** What stands on a place of the drawing, always at the same size on the screen. */
export type DrawingMark = {
  id: string;
  at: Point; // m
  /** Unit vector along which the mark stands off from its place. */
  off?: Point;
  /** Drawn about (0, 0) within 13 px. */
  draw: ReactNode;
  /** Marks that matter more keep their room. */
  weight?: number;
};

type DrawingViewProps = {
  /** What the drawing shows, for who doesn't see it. */
  label: string;
  contours: readonly { segments: readonly Segment[] }[];
  /** Chains that don't close: dashed, they bound nothing. */
  open?: readonly { segments: readonly Segment[] }[];
  /** Plate around the part. */
  plate?: Box | null;
  /** Loops of the corner plan; the chosen one is drawn heavier. */
  loops?: readonly { id: string; segments: readonly Segment[] }[];
  marks?: readonly DrawingMark[];
  chosen?: string | null;
  onChoose?: (id: string | null) => void;
  height: number;
};

/** Drawing units an own metre of path text holds: millimetres keep three digits at a micrometre. */
const textScale = 1000;
const markOff = 22;

/** The part as a technical drawing: outline, section hatch, holes, centre lines; moved and enlarged by touch, wheel, keys and buttons. */
export function DrawingView({
  label,
  contours,
  open = [],
  plate = null,
  loops = [],
  marks = [],
  chosen = null,
  onChoose,
  height,
}: DrawingViewProps) {
  const id = useId().replace(/\W/g, '');
  const frameRef = useRef<HTMLElement>(null);
  const width = useWidth(frameRef, 640);
  const frame = { width, height };

  const box = useMemo(() => {
    const drawn = pathsBox([...contours, ...open, ...loops]);
    const all = plate ? boxUnion(drawn, plate) : drawn;
    return Number.isFinite(all.minX) ? all : { minX: 0, minY: 0, maxX: 0.1, maxY: 0.1 };
  }, [contours, open, loops, plate]);
  // path texts are written once; moving and enlarging is one transform
  const texts = useMemo(() => {
    const origin = { x: (box.minX + box.maxX) / 2, y: (box.minY + box.maxY) / 2 };
    const write = (segments: readonly Segment[]) => svgPathData(segments, { scale: textScale, origin });
    return {
      origin,
      part: contours.map(({ segments }) => (segments.length > 0 ? `${write(segments)}Z` : '')).join(''),
      open: open.map(({ segments }) => write(segments)).join(''),
      loops: loops.map((loop) => ({ id: loop.id, data: write(loop.segments) })),
      circles: contours.flatMap((contour) => contourCircle(contour) ?? []),
    };
  }, [box, contours, open, loops]);

  const placeMarks = (seen: ViewWindow) => {
    const ranked = [...marks].sort(
      (a, b) => Number(b.id === chosen) - Number(a.id === chosen) || (b.weight ?? 0) - (a.weight ?? 0),
    );
    return marksSpread(
      ranked.map((mark) => {
        const at = windowToFrame(seen, frame, mark.at);
        const off = mark.off ?? { x: 0, y: 0 };
        return { id: mark.id, x: at.x + off.x * markOff, y: at.y - off.y * markOff };
      }),
      24,
    );
  };
  const { view, fitted, fit, zoomBy } = usePanZoom(frameRef, box, frame, (at, seen) =>
    onChoose?.(markNearest(placeMarks(seen), at, 30)),
  );
  const zoom = view.scale / textScale;
  const place = windowToFrame(view, frame, texts.origin);
  const placed = placeMarks(view);
  const corner = plate && windowToFrame(view, frame, { x: plate.minX, y: plate.maxY });

  return (
    <View style={styles.sheet}>
      <View
        // on the web a view's host is the page's own element, whose pointers and wheel move the drawing
        ref={(host: unknown) => {
          frameRef.current = host instanceof HTMLElement ? host : null;
        }}
        tabIndex={0}
        role="group"
        aria-label={drawingText.keys}
        // whole drawing in view: a finger scrolls the page; enlarged: it moves the drawing
        style={{ overflow: 'hidden', width: '100%', height, touchAction: fitted ? 'pan-y' : 'none' }}
      >
        <Svg width="100%" height={height} role="img" aria-label={label}>
          <Defs>
            <HatchPattern id={`${id}steel`} spacing={9} colour={roles.steelLine} weight={0.9} scale={1 / zoom} />
          </Defs>
          {plate && corner && (
            <Rect
              x={corner.x}
              y={corner.y}
              width={(plate.maxX - plate.minX) * view.scale}
              height={(plate.maxY - plate.minY) * view.scale}
              fill="none"
              stroke={roles.ink}
              strokeWidth={1.4}
            />
          )}
          <G transform={`translate(${place.x} ${place.y}) scale(${zoom})`}>
            <Path d={texts.part} fill={roles.steelFill} fillRule="evenodd" />
            <Path
              d={texts.part}
              fill={`url(#${id}steel)`}
              fillRule="evenodd"
              stroke={roles.ink}
              strokeWidth={line.outline}
              strokeLinejoin="round"
              vectorEffect="non-scaling-stroke"
            />
            {texts.open !== '' && (
              <Path
                d={texts.open}
                fill="none"
                stroke={roles.hot}
                strokeWidth={2}
                strokeDasharray="8 5"
                vectorEffect="non-scaling-stroke"
              />
            )}
            {texts.loops.map((loop) => (
              <Path
                key={loop.id}
                testID="drawing-loop"
                d={loop.data}
                fill="none"
                stroke={roles.ember}
                strokeWidth={loop.id === chosen ? 3.4 : 2}
                vectorEffect="non-scaling-stroke"
              />
            ))}
          </G>
          {texts.circles.map(({ centre, radius }, index) => {
            const at = windowToFrame(view, frame, centre);
            const reach = radius * view.scale;
            // a hole of a few px would vanish under its own cross
            if (reach < 9) return null;
            const arm = reach + Math.min(14, reach * 0.3);
            return (
              <Path
                key={index}
                d={`M${at.x - arm} ${at.y}h${2 * arm}M${at.x} ${at.y - arm}v${2 * arm}`}
                stroke={roles.softInk}
                strokeWidth={1}
                strokeDasharray={centreLine}
              />
            );
          })}
          {/* what matters most is drawn last: a dot never lies on a badge */}
          {[...placed].reverse().map((mark) => (
            <G key={mark.id} testID="drawing-mark" transform={`translate(${mark.x} ${mark.y})`}>
              {mark.full ? marks.find(({ id: own }) => own === mark.id)?.draw : <Circle r={3} fill={roles.ink} />}
            </G>
          ))}
        </Svg>
      </View>
      <View style={styles.buttons}>
        <Button label="+" spoken={drawingText.larger} onPress={() => zoomBy(1.5)} />
        <Button label="−" spoken={drawingText.smaller} onPress={() => zoomBy(1 / 1.5)} />
        <Button label={drawingText.whole} spoken={drawingText.wholeSpoken} onPress={fit} />
      </View>
    </View>
  );
}

const styles = StyleSheet.create({
  sheet: { backgroundColor: roles.sheet, borderWidth: 1, borderColor: roles.rule },
  // below the drawing, so that nothing is ever covered
  buttons: {
    flexDirection: 'row',
    gap: 8,
    padding: 8,
    justifyContent: 'flex-end',
    borderTopWidth: 1,
    borderTopColor: roles.rule,
  },
});
