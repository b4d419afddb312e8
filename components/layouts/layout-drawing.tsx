import { useMemo, useState, type Ref } from 'react';
import { G, Circle, Path, Text as SvgText } from 'react-native-svg';
import { DrawingView, type DrawingControl, type DrawingMark } from '@/components/parts/drawing-view.tsx';
import { layoutsText } from '@/components/text/layouts.ts';
import { roles } from '@/components/theme/roles.ts';
import { useLayout } from '@/components/theme/layout.ts';
import { family } from '@/components/theme/type.ts';
import { contourContains, lineBetween, type Point, type Segment } from '@/strategy/path/index.ts';
import { startOf, type LayoutProblem, type PlacedPart, type PlateOutline } from '@/strategy/path/plate/index.ts';

type LayoutDrawingProps = {
  name: string;
  outline: PlateOutline;
  lies: readonly PlacedPart[];
  order: readonly string[];
  problems: readonly LayoutProblem[];
  chosen: number | null;
  onChoose: (number: number | null) => void;
  /** A chosen piece was pushed by so much, m; none where the layout is read only. */
  onPush: ((number: number, by: Point) => void) | null;
  showWay: boolean;
  control?: Ref<DrawingControl>;
};

/** The plate with its pieces as a technical drawing: their numbers, what is in the way, the way between the cuts. A chosen piece follows the pointer. */
export function LayoutDrawing({
  name,
  outline,
  lies,
  order,
  problems,
  chosen,
  onChoose,
  onPush,
  showWay,
  control,
}: LayoutDrawingProps) {
  const { wide } = useLayout();
  const [ghost, setGhost] = useState<Point | null>(null);
  const contours = useMemo(() => lies.flatMap((part) => part.contours.map(({ contour }) => contour)), [lies]);
  const edges = useMemo(() => [outline.edge, ...outline.openings], [outline]);
  const own = lies.find(({ number }) => number === chosen);
  const traces = useMemo(
    () => [
      ...(showWay ? [{ id: 'way', kind: 'way' as const, segments: wayOf(lies, order) }] : []),
      ...(own
        ? own.contours.map(({ id, contour }) => ({ id, kind: 'chosen' as const, segments: contour.segments }))
        : []),
    ],
    [lies, order, own, showWay],
  );
  const marks = useMemo(() => marksOf(lies, problems, chosen), [lies, problems, chosen]);

  return (
    <DrawingView
      label={layoutsText.drawing({ name }, lies.length, problems.length)}
      contours={contours}
      outline={edges}
      traces={traces}
      marks={marks}
      chosen={chosen === null ? null : `piece ${chosen}`}
      onChoose={(mark) => onChoose(mark === null ? null : numberOf(mark, problems))}
      onPlace={(place) => onChoose(pieceAt(lies, place))}
      {...(own && onPush
        ? {
            onTake: (place: Point) => {
              if (!covers(own, place)) return null;
              let pushed: Point | null = null;
              return {
                move: (by: Point) => {
                  pushed = by;
                  setGhost(by);
                },
                drop: () => {
                  setGhost(null);
                  if (pushed) onPush(own.number, pushed);
                },
                cancel: () => setGhost(null),
              };
            },
          }
        : {})}
      over={(space) =>
        ghost &&
        own && (
          <G
            testID="layout-ghost"
            transform={`translate(${ghost.x * space.scale} ${-ghost.y * space.scale}) scale(${space.zoom})`}
          >
            <Path
              d={own.contours.map(({ contour }) => `${space.write(contour.segments)}Z`).join('')}
              fill={roles.touched}
              fillOpacity={0.6}
              fillRule="evenodd"
              stroke={roles.ember}
              strokeWidth={2}
              strokeDasharray="6 4"
              vectorEffect="non-scaling-stroke"
            />
          </G>
        )
      }
      control={control}
      height={wide ? 560 : 360}
    />
  );
}

const numberOf = (mark: string, problems: readonly LayoutProblem[]): number | null => {
  const [kind, index] = mark.split(' ');
  return kind === 'piece' ? Number(index) : (problems[Number(index)]?.placements[0] ?? null);
};

/** The topmost piece at a place: the one listed last. */
const pieceAt = (lies: readonly PlacedPart[], place: Point): number | null =>
  lies.findLast((part) => covers(part, place))?.number ?? null;

/** Whether a place lies within a piece's outline: its holes are its own too, for a finger. */
const covers = ({ contours, box }: PlacedPart, place: Point): boolean =>
  place.x >= box.minX &&
  place.x <= box.maxX &&
  place.y >= box.minY &&
  place.y <= box.maxY &&
  contours.some(({ role, contour }) => role === 'outer' && contourContains(contour, place));

function wayOf(lies: readonly PlacedPart[], order: readonly string[]): Segment[] {
  const starts = new Map(lies.flatMap(({ contours }) => contours.map((one) => [one.id, startOf(one)] as const)));
  let at: Point = { x: 0, y: 0 };
  return order.flatMap((id) => {
    const next = starts.get(id);
    if (!next || (next.x === at.x && next.y === at.y)) return [];
    const leg = lineBetween(at, next);
    at = next;
    return [leg];
  });
}

function marksOf(
  lies: readonly PlacedPart[],
  problems: readonly LayoutProblem[],
  chosen: number | null,
): readonly DrawingMark[] {
  return [
    ...problems.map(({ at }, i) => ({ id: `problem ${i}`, at, weight: 2, draw: <ProblemMark /> })),
    ...lies.map(({ number, box }) => ({
      id: `piece ${number}`,
      at: { x: (box.minX + box.maxX) / 2, y: (box.minY + box.maxY) / 2 },
      weight: 1,
      draw: <PieceMark number={number} chosen={number === chosen} />,
    })),
  ];
}

/** A piece's number on a sheet of paper. */
function PieceMark({ number, chosen }: { number: number; chosen: boolean }) {
  return (
    <G>
      <Circle r={13} fill={roles.sheet} stroke={chosen ? roles.ember : roles.ink} strokeWidth={chosen ? 3 : 1.4} />
      <SvgText y={5} textAnchor="middle" fontFamily={family.figure} fontSize={number > 99 ? 12 : 15} fill={roles.ink}>
        {number}
      </SvgText>
    </G>
  );
}

/** The caution's triangle, which nothing else may use. */
function ProblemMark() {
  return (
    <G>
      <Path d="M0 -11 11 9H-11Z" fill={roles.sheet} stroke={roles.hot} strokeWidth={2.2} strokeLinejoin="round" />
      <Path d="M0 -5V2M0 4.4v1.8" stroke={roles.hot} strokeWidth={2.2} />
    </G>
  );
}
