import { memo, useCallback, useId, useImperativeHandle, useMemo, useRef, type ReactNode, type Ref } from 'react';
import { StyleSheet, View } from 'react-native';
import Svg, { Defs, G, Path } from 'react-native-svg';
import { centreLine, HatchPattern } from '@/components/pierce/hatch.tsx';
import { drawingText } from '@/components/text/parts.ts';
import { useLayout } from '@/components/theme/layout.ts';
import { roles } from '@/components/theme/roles.ts';
import { line } from '@/components/theme/space.ts';
import { webStyle } from '@/components/theme/web-style.ts';
import { Button } from '@/components/ui/button.tsx';
import { Fold } from '@/components/ui/fold.tsx';
import { Small } from '@/components/ui/text.tsx';
import type { Box, Point, Segment } from '@/strategy/path/index.ts';
import { dotsData, markNearest, marksSpread } from './drawing-marks.ts';
import { useDrawnBox, useDrawnTexts } from './drawing-paths.ts';
import { drawingSpace, type DrawingSpace, type DrawnSheet } from './drawing-space.ts';
import { drawnAround, usePanZoom } from './use-pan-zoom.ts';
import { useWidth } from './use-width.ts';
import { windowToFrame, windowToPlace, type ViewWindow } from './view-window.ts';

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

/** What a screen may ask of its drawing. */
export type DrawingControl = {
  /** Shows a stretch of so many metres around a place. */
  goTo: (place: Point, metres: number) => void;
};

/** Told apart by line: heavy for what is chosen, dotted for a way between cuts, long dashes for what is eased. */
export type DrawnTrace = 'chosen' | 'way' | 'ease';

type Drawn = { readonly segments: readonly Segment[] };

type DrawingViewProps = {
  /** What the drawing shows, for who doesn't see it. */
  label: string;
  contours: readonly Drawn[];
  /** Chains that don't close: dashed, they bound nothing. */
  open?: readonly Drawn[];
  /** Plate around the part. */
  plate?: Box | null;
  /** Its edge and openings where it is no rectangle. */
  outline?: readonly Drawn[];
  /** Thin lines over the drawing: what is chosen, the way between cuts. They don't change what is in view. */
  traces?: readonly (Drawn & { id: string; kind: DrawnTrace })[];
  /** Loops of the corner plan; the chosen one is drawn heavier. */
  loops?: readonly (Drawn & { id: string })[];
  /** What loops cut out and let fall. */
  slugs?: readonly Drawn[];
  leadIns?: readonly Drawn[];
  marks?: readonly DrawingMark[];
  chosen?: string | null;
  onChoose?: (id: string | null) => void;
  /** A tap that meets no mark. */
  onPlace?: (place: Point) => void;
  /** With it every tap, and Enter for the place under the cross in the middle, means a place and no mark. `reach` is a finger's, m. */
  onAim?: ((place: Point, reach: number) => void) | null;
  /** What of the drawing a pointer may push; by how much so far, m. A finger then no longer scrolls the page here. */
  onTake?: (place: Point) => { move: (by: Point) => void; drop: () => void; cancel: () => void } | null;
  /** Drawn over the rest and moved with it; drawn again without it. */
  over?: (space: DrawingSpace, sheet: DrawnSheet) => ReactNode;
  /** Laid under the lines and moved with them, in the place of the steel's own fill. */
  under?: ((space: DrawingSpace, sheet: DrawnSheet) => ReactNode) | undefined;
  /** Beside the buttons, and what else is to be known of them. */
  tools?: ReactNode;
  ways?: string;
  control?: Ref<DrawingControl>;
  height: number;
};

/** How far a mark stands off from its place along its unit vector, px. */
export const markOff = 22;
const fingerReach = 30;
/** A tap nearer than this means the mark, and not what lies under it. */
const markReach = 16;
/** More marks than this in the frame are dots, but for those that matter most. */
const mostMarks = 100;
const none: readonly never[] = [];

/** The part as a technical drawing: outline, section hatch, holes, centre lines; moved and enlarged by touch, wheel, keys and buttons. */
export function DrawingView({
  label,
  contours,
  open = none,
  plate = null,
  outline = none,
  traces = none,
  loops = none,
  slugs = none,
  leadIns = none,
  marks = none,
  chosen = null,
  onChoose,
  onPlace,
  onAim = null,
  onTake,
  over,
  under,
  tools,
  ways = '',
  control,
  height,
}: DrawingViewProps) {
  const frameRef = useRef<HTMLElement>(null);
  const layersRef = useRef<HTMLElement>(null);
  const { wide } = useLayout();
  const width = useWidth(frameRef, 640);
  const frame = { width, height };
  const paths = { contours, open, loops, slugs, leadIns, plate, outline, traces };
  const box = useDrawnBox(paths);
  const origin = { x: (box.minX + box.maxX) / 2, y: (box.minY + box.maxY) / 2 };

  const ranked = useMemo(
    () =>
      [...marks].sort((a, b) => Number(b.id === chosen) - Number(a.id === chosen) || (b.weight ?? 0) - (a.weight ?? 0)),
    [marks, chosen],
  );
  /** Marks near the frame, px from the drawing's middle. */
  const placeMarks = (seen: ViewWindow) => {
    const middle = windowToFrame(seen, frame, origin);
    const beyond = (at: Point, by: number) =>
      Math.abs(at.x + middle.x - width / 2) > width * (0.5 + by) ||
      Math.abs(at.y + middle.y - height / 2) > height * (0.5 + by);
    const near = ranked.flatMap((mark) => {
      const at = { x: (mark.at.x - origin.x) * seen.scale, y: (origin.y - mark.at.y) * seen.scale };
      return beyond(at, drawnAround) && mark.id !== chosen ? [] : [{ mark, at, seen: !beyond(at, 0) }];
    });
    // too many to tell apart? Then what is in order is a dot on its place, and only the rest stands off it
    const crowded = near.filter((one) => one.seen).length > mostMarks;
    const stands = ({ id, weight = 0 }: DrawingMark) => !crowded || weight > 1 || id === chosen;
    const standing = near.filter(({ mark }) => stands(mark)).sort((a, b) => Number(b.seen) - Number(a.seen));
    const placed = marksSpread(
      standing.map(({ mark: { id, off = { x: 0, y: 0 } }, at }) => ({
        id,
        x: at.x + off.x * markOff,
        y: at.y - off.y * markOff,
      })),
      24,
      2 * mostMarks,
    );
    const lying = near.flatMap(({ mark, at }) => (stands(mark) ? [] : [{ id: mark.id, ...at, full: false }]));
    return [...placed, ...lying];
  };

  const { view, fitted, fit, zoomBy, goTo } = usePanZoom({
    frameRef,
    layersRef,
    box,
    frame,
    onTap: (at, seen) => {
      if (onAim) return onAim(windowToPlace(seen, frame, at), fingerReach / seen.scale);
      const middle = windowToFrame(seen, frame, origin);
      const local = { x: at.x - middle.x, y: at.y - middle.y };
      const mark = markNearest(placeMarks(seen), local, onPlace ? markReach : fingerReach);
      if (mark === null && onPlace) onPlace(windowToPlace(seen, frame, at));
      else onChoose?.(mark);
    },
    ...(onAim ? { onEnter: (seen) => onAim(seen.middle, fingerReach / seen.scale) } : {}),
    ...(onTake
      ? {
          onTake: (at, seen) => {
            const taken = onTake(windowToPlace(seen, frame, at));
            return taken && { ...taken, move: (dx, dy) => taken.move({ x: dx / seen.scale, y: -dy / seen.scale }) };
          },
        }
      : {}),
  });
  useImperativeHandle(control, () => ({ goTo }), [goTo]);

  const texts = useDrawnTexts(paths, box, view.scale);
  const space = useMemo(
    () => drawingSpace(texts.origin, view.scale, texts.write),
    [texts.origin, texts.write, view.scale],
  );
  const { x: middleX, y: middleY } = windowToFrame(view, frame, texts.origin);
  const sheet: DrawnSheet = useMemo(
    () => ({
      width: width * (1 + 2 * drawnAround),
      height: height * (1 + 2 * drawnAround),
      x: middleX + width * drawnAround,
      y: middleY + height * drawnAround,
    }),
    [width, height, middleX, middleY],
  );
  const placed = placeMarks(view);
  const drawnMarks = useMemo(() => new Map(marks.map(({ id, draw }) => [id, draw])), [marks]);
  const matters = useMemo(() => new Set(marks.filter(({ weight }) => weight !== 0).map(({ id }) => id)), [marks]);
  const small = placed.filter(({ full }) => !full);
  const dots = (strong: boolean) =>
    dotsData(
      small.filter(({ id }) => matters.has(id) === strong),
      strong ? 5 : 4,
    );

  return (
    <View style={styles.sheet}>
      <View
        // on the web a view's host is the page's own element, whose pointers and wheel move the drawing
        ref={useCallback((host: unknown) => {
          frameRef.current = host instanceof HTMLElement ? host : null;
        }, [])}
        tabIndex={0}
        role="group"
        aria-label={onAim ? `${drawingText.keys} ${drawingText.placeKeys}` : drawingText.keys}
        // whole drawing in view: a finger scrolls the page; enlarged: it moves the drawing
        style={{ overflow: 'hidden', width: '100%', height, touchAction: fitted && !onTake ? 'pan-y' : 'none' }}
      >
        <View
          ref={useCallback((host: unknown) => {
            layersRef.current = host instanceof HTMLElement ? host : null;
          }, [])}
          style={[
            styles.layers,
            { left: -width * drawnAround, top: -height * drawnAround, width: sheet.width, height: sheet.height },
            webStyle({ transformOrigin: `${width * drawnAround}px ${height * drawnAround}px` }),
          ]}
        >
          {under && (
            <View style={[styles.under, { width: sheet.width, height: sheet.height }]}>{under(space, sheet)}</View>
          )}
          <Svg width={sheet.width} height={sheet.height} role="img" aria-label={label} style={styles.drawn}>
            <G transform={`translate(${sheet.x} ${sheet.y})`}>
              <Still
                zoom={space.zoom}
                part={texts.part}
                open={texts.open}
                plate={texts.plate}
                outline={texts.outline}
                traces={texts.traces}
                leadIns={texts.leadIns}
                slugs={texts.slugs}
                loops={texts.loops}
                chosen={chosen}
                filled={!under}
              />
              <Path
                d={texts.circles.map(({ centre, radius }) => cross(space.at(centre), radius * view.scale)).join('')}
                stroke={roles.softInk}
                strokeWidth={1}
                strokeDasharray={centreLine}
              />
              <Dots data={dots(false)} width={3} />
              <Dots data={dots(true)} width={5} />
              {/* what matters most is drawn last */}
              {placed
                .filter(({ full }) => full)
                .reverse()
                .map(({ id, x, y }) => (
                  <PlacedMark key={id} x={x} y={y} draw={drawnMarks.get(id)} />
                ))}
            </G>
          </Svg>
          {over && (
            <View style={[styles.over, { width: sheet.width, height: sheet.height }]}>
              <Svg width={sheet.width} height={sheet.height} aria-hidden>
                <G transform={`translate(${sheet.x} ${sheet.y})`}>{over(space, sheet)}</G>
              </Svg>
            </View>
          )}
        </View>
        {onAim && (
          <View style={[styles.over, { left: width / 2 - 20, top: height / 2 - 20 }]}>
            <Svg width={40} height={40} aria-hidden>
              <Path d="M20 2V15M20 25V38M2 20H15M25 20H38" stroke={roles.ink} strokeWidth={1.4} />
            </Svg>
          </View>
        )}
      </View>
      <View style={styles.buttons}>
        <View style={styles.tools}>{tools}</View>
        <View style={styles.zoom}>
          <Button label="+" spoken={drawingText.larger} onPress={() => zoomBy(1.5)} />
          <Button label="−" spoken={drawingText.smaller} onPress={() => zoomBy(1 / 1.5)} />
          <Button label={drawingText.whole} spoken={drawingText.wholeSpoken} onPress={fit} />
        </View>
      </View>
      <View style={styles.ways}>
        {wide ? (
          <Small>{`${drawingText.ways} ${ways}`}</Small>
        ) : (
          <Fold label={drawingText.waysTitle}>
            <Small>{`${drawingText.ways} ${ways}`}</Small>
          </Fold>
        )}
      </View>
    </View>
  );
}

type StillProps = {
  zoom: number;
  part: string;
  open: string;
  plate: string;
  outline: string;
  traces: readonly { id: string; kind: DrawnTrace; data: string }[];
  leadIns: string;
  slugs: string;
  loops: readonly { id: string; data: string }[];
  chosen: string | null;
  /** The steel has its own fill, and not what is laid under it. */
  filled: boolean;
};

/** What is drawn the same wherever it is moved to: drawn again only when the scale or the drawing changes. */
const Still = memo(function Still({
  zoom,
  part,
  open,
  plate,
  outline,
  traces,
  leadIns,
  slugs,
  loops,
  chosen,
  filled,
}: StillProps) {
  const id = useId().replace(/\W/g, '');
  const others = useMemo(
    () =>
      loops
        .filter((loop) => loop.id !== chosen)
        .map(({ data }) => data)
        .join(''),
    [loops, chosen],
  );
  const own = loops.find((loop) => loop.id === chosen);
  return (
    <>
      <Defs>
        <HatchPattern id={`${id}steel`} spacing={9} colour={roles.steelLine} weight={0.9} scale={1 / zoom} />
        <HatchPattern id={`${id}slug`} spacing={5} colour={roles.softInk} weight={0.9} scale={1 / zoom} falling />
      </Defs>
      <G transform={`scale(${zoom})`}>
        <Stroke data={plate} colour={roles.ink} width={1.4} />
        {filled ? (
          <Path d={part} fill={roles.steelFill} fillRule="evenodd" />
        ) : (
          // a casing of paper: the outline is seen on any ground
          <Path
            d={part}
            fill="none"
            stroke={roles.sheet}
            strokeWidth={line.outline + 2.6}
            strokeLinejoin="round"
            vectorEffect="non-scaling-stroke"
          />
        )}
        <Path
          d={part}
          fill={`url(#${id}steel)`}
          fillOpacity={filled ? 1 : 0.5}
          fillRule="evenodd"
          stroke={roles.ink}
          strokeWidth={line.outline}
          strokeLinejoin="round"
          vectorEffect="non-scaling-stroke"
        />
        {slugs !== '' && <Path d={slugs} fill={`url(#${id}slug)`} />}
        <Stroke data={open} colour={roles.hot} width={2} dash="8 5" />
        <Stroke data={outline} colour={roles.ink} width={1.4} />
        {traces.map(({ id: own, kind, data }) => (
          <Path
            key={own}
            testID={`drawing-${kind}`}
            d={data}
            fill="none"
            {...traceLines[kind]}
            vectorEffect="non-scaling-stroke"
          />
        ))}
        <Stroke data={leadIns} colour={roles.ember} width={1.4} dash="4 2.5" />
        {others !== '' && (
          <Path
            testID="drawing-loop"
            d={others}
            fill="none"
            stroke={roles.ember}
            strokeWidth={2}
            vectorEffect="non-scaling-stroke"
          />
        )}
        {own && (
          <Path
            testID="drawing-loop"
            d={own.data}
            fill="none"
            stroke={roles.ember}
            strokeWidth={3.4}
            vectorEffect="non-scaling-stroke"
          />
        )}
      </G>
    </>
  );
});

const traceLines = {
  chosen: { stroke: roles.ember, strokeWidth: 3 },
  way: { stroke: roles.softInk, strokeWidth: 1.2, strokeDasharray: '2 4' },
  ease: { stroke: roles.ember, strokeWidth: 3, strokeDasharray: '9 3' },
} as const satisfies Record<DrawnTrace, object>;

function Stroke({ data, colour, width, dash }: { data: string; colour: string; width: number; dash?: string }) {
  if (data === '') return null;
  return (
    <Path
      d={data}
      fill="none"
      stroke={colour}
      strokeWidth={width}
      strokeDasharray={dash}
      vectorEffect="non-scaling-stroke"
    />
  );
}

/** Marks that have no room: a round pen's points. */
const Dots = memo(function Dots({ data, width }: { data: string; width: number }) {
  if (data === '') return null;
  return (
    <Path testID="drawing-dots" d={data} fill="none" stroke={roles.ink} strokeWidth={width} strokeLinecap="round" />
  );
});

const PlacedMark = memo(function PlacedMark({ x, y, draw }: { x: number; y: number; draw: ReactNode }) {
  return (
    <G testID="drawing-mark" transform={`translate(${x} ${y})`}>
      {draw}
    </G>
  );
});

/** Centre lines of a circle; one of a few px would vanish under its own cross. */
function cross(at: Point, reach: number): string {
  if (reach < 9) return '';
  const arm = reach + Math.min(14, reach * 0.3);
  return `M${at.x - arm} ${at.y}h${2 * arm}M${at.x} ${at.y - arm}v${2 * arm}`;
}

const styles = StyleSheet.create({
  sheet: { backgroundColor: roles.sheet, borderWidth: 1, borderColor: roles.rule },
  // a layer of its own: moving it draws nothing anew
  layers: { position: 'absolute', ...webStyle({ willChange: 'transform' }) },
  under: { position: 'absolute', left: 0, top: 0, pointerEvents: 'none' },
  // what is laid under it has a place of its own, and would else stand above
  drawn: { position: 'relative' },
  over: { position: 'absolute', left: 0, top: 0, pointerEvents: 'none', ...webStyle({ willChange: 'transform' }) },
  // below the drawing, so that nothing is ever covered
  buttons: {
    flexDirection: 'row',
    flexWrap: 'wrap',
    gap: 8,
    padding: 8,
    justifyContent: 'flex-end',
    borderTopWidth: 1,
    borderTopColor: roles.rule,
  },
  tools: { flexDirection: 'row', flexWrap: 'wrap', flexGrow: 1, flexShrink: 1, gap: 8 },
  zoom: { flexDirection: 'row', gap: 8 },
  ways: { paddingHorizontal: 12, paddingBottom: 8 },
});
