import type { Condition } from '@/shared/strategies.ts';
import type { Stage } from '@/strategy/pierce/stage.ts';

/** Width of drawing-office lettering at 14 px, px a character: Barlow Condensed 500, the widest of its common letters averaged in. */
const letterWidth = 6.7;

export const letteringWidth = (text: string, size = 14): number => (text.length * letterWidth * size) / 14;

/** When each stage ends, s from the pierce's start. */
export function stageEnds(stages: readonly Pick<Stage, 'duration'>[]): number[] {
  let end = 0;
  return stages.map((stage) => (end += stage.duration));
}

/** The first wording that fits the room, or none: a label never runs over its neighbour. */
export const fittingLabel = (room: number, wordings: readonly string[], size = 14): string | null =>
  wordings.find((text) => letteringWidth(text, size) + 12 <= room) ?? null;

/** A dimension line: from and to in px, with its lettering in a gap in the middle, or bare where nothing fits. */
export type DimensionSpan = {
  from: number;
  to: number;
  text: string | null;
  /** The gap the lettering stands in, px. */
  gap: { from: number; to: number } | null;
};

export function dimensionSpan(from: number, to: number, wordings: readonly string[]): DimensionSpan {
  // oblique ticks and a stub of line on both sides keep their room
  const text = fittingLabel(to - from - 20, wordings);
  if (text === null) return { from, to, text, gap: null };
  const half = letteringWidth(text) / 2 + 5;
  const middle = (from + to) / 2;
  return { from, to, text, gap: { from: middle - half, to: middle + half } };
}

/** The trace up to the moment of breakthrough, each point finite. */
export function traceUntilThrough(
  condition: Pick<Condition, 'trace' | 'breakthrough' | 'thickness'>,
): { time: number; depth: number }[] {
  const { time, depth } = condition.trace;
  const through = condition.breakthrough.kind === 'ok' ? condition.breakthrough.value : Infinity;
  const points: { time: number; depth: number }[] = [];
  for (let i = 0; i < time.length; i++) {
    const t = time[i];
    const z = depth[i];
    if (t === undefined || z === undefined || !Number.isFinite(t) || !Number.isFinite(z)) continue;
    if (t >= through) break;
    points.push({ time: t, depth: Math.min(z, condition.thickness) });
  }
  if (Number.isFinite(through)) points.push({ time: through, depth: condition.thickness });
  return points;
}

/** SVG path through points already in px. */
export const polylineData = (points: readonly { x: number; y: number }[]): string =>
  points.map(({ x, y }, i) => `${i === 0 ? 'M' : 'L'}${round(x)} ${round(y)}`).join('');

const round = (value: number) => Math.round(value * 10) / 10;

/** A moment of a lane. `knot` names the end of the stage that holds the number; points between knots only draw a curve. */
export type LanePoint = { time: number; value: number; knot: { stage: number; end: 'from' | 'to' } | null };

export type LaneName = 'standoff' | 'focusPosition' | 'meanPower' | 'oxygenPressure';
export const laneNames: readonly LaneName[] = ['standoff', 'focusPosition', 'meanPower', 'oxygenPressure'];

/** A quantity's course over the pierce, SI. Mean power is peak × duty, a curve where both of them go. */
export function lanePoints(stages: readonly Stage[], lane: LaneName): LanePoint[] {
  const ends = stageEnds(stages);
  return stages.flatMap((stage, index) => {
    const start = (ends[index] ?? 0) - stage.duration;
    const steps = lane === 'meanPower' && stage.from.duty !== stage.to.duty ? 8 : 1;
    return Array.from({ length: steps + 1 }, (_, i): LanePoint => {
      const share = i / steps;
      const mix = (name: 'standoff' | 'focusPosition' | 'peakPower' | 'duty' | 'oxygenPressure') =>
        stage.from[name] + share * (stage.to[name] - stage.from[name]);
      return {
        time: start + share * stage.duration,
        value: lane === 'meanPower' ? mix('peakPower') * mix('duty') : mix(lane),
        knot: i === 0 ? { stage: index, end: 'from' } : i === steps ? { stage: index, end: 'to' } : null,
      };
    });
  });
}
