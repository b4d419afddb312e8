import { useRef, type KeyboardEvent, type PointerEvent } from 'react';
import { knotText } from '@/components/text/pierce-designer.ts';
import { roles } from '@/components/theme/roles.ts';
import { touch } from '@/components/theme/space.ts';
import { family } from '@/components/theme/type.ts';
import type { FocusScale, MachineProfile } from '@/strategy/machine.ts';
import type { Stage } from '@/strategy/pierce/stage.ts';
import type { UnitSystem } from '@/strategy/units/index.ts';
import {
  clamped,
  laneKnots,
  snapped,
  stepped,
  targetOf,
  targetRange,
  targetSame,
  targetSteps,
  type Knot,
  type Range,
  type Steps,
  type Target,
} from './knots.ts';
import { laneNumber, laneUnit, laneY, type LaneScale } from './lane-scale.ts';
import type { SectionGeometry } from './section-geometry.ts';
import { letteringWidth, stageEnds, type LaneName } from './section-layout.ts';

/** How the numbers of the drawing are moved. */
export type KnotEditing = {
  readonly profile: MachineProfile;
  readonly target: Target | null;
  readonly onTarget: (target: Target) => void;
  /** While something is dragged: the value it would get; null when it goes back to where it was. */
  readonly onPreview: (preview: { target: Target; value: number } | null) => void;
  readonly onCommit: (target: Target, value: number) => void;
  /** A key or a button has been let go: what follows is another step. */
  readonly onSettle: () => void;
};

type KnotLayerProps = {
  editing: KnotEditing;
  stages: readonly Stage[];
  lanes: readonly LaneName[];
  scales: readonly LaneScale[];
  geometry: SectionGeometry;
  system: UnitSystem;
};

/** Everything in the section that can be taken hold of: the lanes' knots, and the stages' ends on the time axis. */
export function KnotLayer({ editing, stages, lanes, scales, geometry, system }: KnotLayerProps) {
  const { x, box } = geometry;
  const ends = stageEnds(stages);
  const zones = zonesBetween(ends.map(x), touch.least);
  return (
    <>
      {lanes.map((lane, index) => {
        const scale = scales[index];
        return (
          scale && (
            <LaneKnots
              key={lane}
              lane={lane}
              scale={scale}
              top={geometry.laneTop(index)}
              {...{ editing, stages, geometry, system }}
            />
          )
        );
      })}
      <g role="group" aria-label={knotText.durations}>
        {ends.map((end, stage) => {
          const target: Target = { kind: 'duration', stage };
          const zone = zones[stage] ?? { from: x(end), to: x(end) };
          const selected = targetSame(editing.target, target);
          const duration = stages[stage]?.duration ?? 0;
          return (
            <Handle
              key={stage}
              axis="x"
              label={knotText.durationLabel(stage)}
              valueText={knotText.duration(duration)}
              value={duration}
              perPixel={geometry.secondsPerPixel}
              range={targetRange(stages, target, editing.profile)}
              steps={targetSteps(target, system)}
              zone={{ x: zone.from, y: geometry.lanesBottom - 8, width: zone.to - zone.from, height: touch.least }}
              tabbable
              {...{ editing, target, selected }}
            >
              <path
                d={`M${x(end) - 4} ${geometry.handleRow - 9}h8v11l-4 6l-4 -6z`}
                fill={selected ? roles.ember : roles.sheet}
                stroke={selected ? roles.ember : roles.ink}
                strokeWidth={1.6}
              />
            </Handle>
          );
        })}
        <HandleValue stages={stages} geometry={geometry} target={editing.target} box={box} />
      </g>
    </>
  );
}

/** The chosen duration beside its handle. */
function HandleValue({
  stages,
  geometry,
  target,
}: {
  stages: readonly Stage[];
  geometry: SectionGeometry;
  target: Target | null;
  box: number;
}) {
  if (target?.kind !== 'duration') return null;
  const end = stageEnds(stages)[target.stage];
  const stage = stages[target.stage];
  if (end === undefined || stage === undefined) return null;
  const text = knotText.duration(stage.duration);
  const width = letteringWidth(text, 16) + 8;
  const before = geometry.x(end) + 12 + width > geometry.right;
  const from = before ? geometry.x(end) - 12 - width : geometry.x(end) + 10;
  return <Value x={from} y={geometry.handleRow + 6} width={width} text={text} />;
}

function Value({ x, y, width, text }: { x: number; y: number; width: number; text: string }) {
  return (
    <g pointerEvents="none" aria-hidden="true">
      <rect x={x} y={y - 15} width={width} height={20} fill={roles.sheet} />
      <text x={x + 4} y={y} fontFamily={family.figure} fontSize={16} fill={roles.ember}>
        {text}
      </text>
    </g>
  );
}

type LaneKnotsProps = Pick<KnotLayerProps, 'editing' | 'stages' | 'geometry' | 'system'> & {
  lane: LaneName;
  scale: LaneScale;
  top: number;
};

function LaneKnots({ lane, scale, top, editing, stages, geometry, system }: LaneKnotsProps) {
  const { x, box } = geometry;
  const knots = laneKnots(stages, lane);
  const zones = zonesBetween(
    knots.map(({ time }) => x(time)),
    touch.least,
  );
  const own = knots.findIndex((knot) => isAt(knot, editing.target));
  const group = useRef<SVGGElement>(null);
  const toNeighbour = (index: number) => {
    const knot = knots[index];
    if (!knot) return;
    editing.onTarget(targetOf(knot));
    group.current?.querySelectorAll<SVGGElement>('[role=slider]')[index]?.focus();
  };
  const chosen = knots[own];
  return (
    <g ref={group} role="group" aria-label={knotText.lane(lane)}>
      {knots.map((knot, index) => {
        const target = targetOf(knot);
        const zone = zones[index] ?? { from: x(knot.time), to: x(knot.time) };
        const at = { x: x(knot.time), y: laneY(laneNumber(knot.value, lane, system), scale, top, box) };
        const selected = index === own;
        // power is moved by its peak: a pixel of mean is more of peak
        const perPixel = siPerPixel(lane, scale, box, system) / (lane === 'meanPower' ? knot.duty : 1);
        const size = selected ? 6.5 : 5;
        return (
          <Handle
            key={`${target.stage} ${knot.ends[0].end}`}
            axis="y"
            label={knotText.knotLabel(knot)}
            valueText={knotValueText(knot, stages, editing.profile.focusScale, system)}
            value={knot.set}
            perPixel={perPixel}
            range={targetRange(stages, target, editing.profile)}
            steps={targetSteps(target, system)}
            zone={{ x: zone.from, y: at.y - touch.least / 2, width: zone.to - zone.from, height: touch.least }}
            tabbable={selected || (own < 0 && index === 0)}
            onNeighbour={(by) => toNeighbour(index + by)}
            {...{ editing, target, selected }}
          >
            <rect
              data-testid="lane-knot"
              x={at.x - size}
              y={at.y - size}
              width={2 * size}
              height={2 * size}
              fill={selected ? roles.ember : roles.sheet}
              stroke={selected ? roles.ember : roles.ink}
              strokeWidth={1.6}
            />
          </Handle>
        );
      })}
      {chosen && (
        <KnotValue
          text={knotValueText(chosen, stages, editing.profile.focusScale, system)}
          at={x(chosen.time)}
          from={geometry.left + letteringWidth(`${knotText.laneShort(lane)}, ${laneUnit(lane, system)}`) + 10}
          to={geometry.right}
          y={top + 14}
        />
      )}
    </g>
  );
}

/** The chosen knot's value in the line of the lane's name: above the knot where there is room, and never under the name. */
function KnotValue({ text, at, from, to, y }: { text: string; at: number; from: number; to: number; y: number }) {
  const width = letteringWidth(text, 16) + 8;
  return <Value x={Math.max(from, Math.min(to - width, at - width / 2))} y={y} width={width} text={text} />;
}

const isAt = (knot: Knot, target: Target | null): boolean =>
  target?.kind === 'knot' &&
  target.lane === knot.lane &&
  knot.ends.some(({ stage, end }) => stage === target.stage && end === target.end);

/** A knot's value as it is read, with the dial's number beside a focus position. */
function knotValueText(knot: Knot, stages: readonly Stage[], scale: FocusScale, system: UnitSystem): string {
  const [{ stage, end }] = knot.ends;
  return knotText.value(knot, stages[stage]?.[end].standoff ?? 0, scale, system);
}

const siPerPixel = (lane: LaneName, { floor, most }: LaneScale, box: number, system: UnitSystem): number =>
  (most - floor) / box / laneNumber(1, lane, system);

/** Where a finger means which of them: halfway to both neighbours, at most a finger's width. */
function zonesBetween(at: readonly number[], widest: number): { from: number; to: number }[] {
  return at.map((x, i) => {
    const before = at[i - 1];
    const after = at[i + 1];
    return {
      from: Math.max(x - widest / 2, before === undefined ? -Infinity : (before + x) / 2),
      to: Math.min(x + widest / 2, after === undefined ? Infinity : (x + after) / 2),
    };
  });
}

type HandleProps = {
  editing: KnotEditing;
  target: Target;
  selected: boolean;
  axis: 'x' | 'y';
  label: string;
  valueText: string;
  value: number;
  /** SI for a pixel to the right or up. */
  perPixel: number;
  range: Range;
  steps: Steps;
  zone: { x: number; y: number; width: number; height: number };
  tabbable: boolean;
  onNeighbour?: (by: 1 | -1) => void;
  children: React.ReactNode;
};

type Drag = { pointer: number; at: number; value: number; perPixel: number; last: number };

/** Within a drawing `touch-action` does not keep Chromium from scrolling the page under the finger; a refused touch does. */
function pageHeldStill(element: SVGGElement) {
  const refuse = (event: TouchEvent) => event.preventDefault();
  element.addEventListener('touchstart', refuse, { passive: false });
  return () => element.removeEventListener('touchstart', refuse);
}

/** One number taken hold of: by pointer and touch along its axis, by keys in steps. */
function Handle(props: HandleProps) {
  const { editing, target, axis, label, valueText, value, perPixel, range, steps, zone, tabbable, onNeighbour } = props;
  const drag = useRef<Drag | null>(null);
  const slider = useRef<SVGGElement>(null);

  const down = (event: PointerEvent<SVGGElement>) => {
    if (event.button !== 0 || drag.current) return;
    event.preventDefault(); // no text is selected, and the focus is set here
    event.currentTarget.setPointerCapture(event.pointerId);
    slider.current?.focus({ preventScroll: true });
    editing.onTarget(target);
    const at = axis === 'x' ? event.clientX : event.clientY;
    drag.current = { pointer: event.pointerId, at, value, perPixel, last: value };
  };
  const move = (event: PointerEvent<SVGGElement>) => {
    const held = drag.current;
    if (held?.pointer !== event.pointerId) return;
    const pixels = axis === 'x' ? event.clientX - held.at : held.at - event.clientY;
    // a tremble is no drag
    const next =
      Math.abs(pixels) < 2 && held.last === held.value
        ? held.value
        : clamped(snapped(held.value + pixels * held.perPixel, steps.snap), range);
    if (next === held.last || !Number.isFinite(next)) return;
    held.last = next;
    editing.onPreview({ target, value: next });
  };
  const up = (event: PointerEvent<SVGGElement>) => {
    const held = drag.current;
    if (held?.pointer !== event.pointerId) return;
    drag.current = null;
    if (held.last !== held.value) editing.onCommit(target, held.last);
    editing.onPreview(null);
    editing.onSettle();
  };
  const cancel = () => {
    drag.current = null;
    editing.onPreview(null);
  };
  const key = (event: KeyboardEvent<SVGGElement>) => {
    if (event.ctrlKey || event.metaKey || event.altKey) return;
    if (event.key === 'Escape' && drag.current) return cancel();
    const neighbour = onNeighbour && (event.key === 'ArrowLeft' ? -1 : event.key === 'ArrowRight' ? 1 : null);
    if (onNeighbour && neighbour) {
      event.preventDefault();
      onNeighbour(neighbour);
      return;
    }
    const next = keyed(event.key, event.shiftKey, value, range, steps);
    if (next === null) return;
    event.preventDefault();
    if (next !== value) editing.onCommit(target, next);
  };

  return (
    <g
      ref={pageHeldStill}
      style={{ cursor: axis === 'x' ? 'ew-resize' : 'ns-resize' }}
      onPointerDown={down}
      onPointerMove={move}
      onPointerUp={up}
      onPointerCancel={cancel}
    >
      {/* outside what takes the focus, so that its ring stays close to the knot and off the lane's name */}
      <rect {...zone} fill="transparent" style={{ touchAction: 'none' }} />
      <g
        ref={slider}
        // what is touched is the zone alone
        pointerEvents="none"
        role="slider"
        tabIndex={tabbable ? 0 : -1}
        aria-label={label}
        aria-orientation={axis === 'x' ? 'horizontal' : 'vertical'}
        aria-valuemin={range.min}
        aria-valuemax={range.max}
        aria-valuenow={value}
        aria-valuetext={valueText}
        onFocus={() => editing.onTarget(target)}
        onBlur={editing.onSettle}
        onKeyDown={key}
        onKeyUp={editing.onSettle}
      >
        {props.children}
      </g>
    </g>
  );
}

/** What a key makes of a number; null for a key that means nothing here. */
function keyed(key: string, shift: boolean, value: number, range: Range, steps: Steps): number | null {
  const by = (direction: 1 | -1, step: number) => clamped(stepped(value, direction, step), range);
  switch (key) {
    case 'ArrowUp':
    case 'ArrowRight':
      return by(1, shift ? steps.coarse : steps.fine);
    case 'ArrowDown':
    case 'ArrowLeft':
      return by(-1, shift ? steps.coarse : steps.fine);
    // on many keyboards plus itself is typed with Shift
    case '+':
    case '=':
      return by(1, steps.fine);
    case '-':
    case '−':
      return by(-1, steps.fine);
    case '_':
      return by(-1, steps.coarse);
    case 'PageUp':
      return by(1, steps.coarse);
    case 'PageDown':
      return by(-1, steps.coarse);
    case 'Home':
      return range.min;
    case 'End':
      return range.max;
    default:
      return null;
  }
}
