import { memo, useId, useMemo } from 'react';
import { Circle, Defs, G, Path } from 'react-native-svg';
import type { DrawingSpace } from '@/components/parts/drawing-space.ts';
import { HatchPattern } from '@/components/pierce/hatch.tsx';
import { roles } from '@/components/theme/roles.ts';
import { clockMoment, type ClockMoment, type PlateClock } from '@/strategy/motion/index.ts';
import { segmentPart, type Segment } from '@/strategy/path/index.ts';
import { useRunTime, type RunClock } from './run-clock.ts';

/** What falls out, a piece to be kept or scrap, and when, s. */
export type Dropped = { readonly time: number; readonly scrap: boolean; readonly segments: readonly Segment[] };

type RunLayerProps = {
  space: DrawingSpace;
  timeline: PlateClock;
  /** In the order of time. */
  dropped: readonly Dropped[];
  clock: RunClock;
};

/** So many segments are drawn anew in each frame at most; what was cut before them stays as it was drawn. */
const chunk = 64;

/** The cut as far as it has run: what is cut drawn heavy, what has dropped out hatched the other way, the head where it is. */
export function RunLayer({ space, timeline, dropped, clock }: RunLayerProps) {
  const time = useRunTime(clock);
  if (time <= 0) return null;
  const moment = clockMoment(timeline, time);
  if (!moment) return null;
  const whole = Math.floor(moment.segment / chunk);
  return (
    <>
      <DroppedOut space={space} dropped={dropped} count={countBefore(dropped, time)} />
      <CutRuns space={space} timeline={timeline} run={moment.run} />
      <CutChunks space={space} timeline={timeline} run={moment.run} chunks={whole} />
      <G transform={`scale(${space.zoom})`}>
        <Heavy data={headData(space, timeline, moment, whole * chunk)} />
      </G>
      <Head space={space} moment={moment} />
    </>
  );
}

const DroppedOut = memo(function DroppedOut({
  space,
  dropped,
  count,
}: Pick<RunLayerProps, 'space' | 'dropped'> & { count: number }) {
  const id = useId().replace(/\W/g, '');
  const [scrap, kept] = useMemo(
    () =>
      [true, false].map((wanted) =>
        dropped
          .slice(0, count)
          .filter((one) => one.scrap === wanted)
          .map(({ segments }) => `${space.write(segments)}Z`)
          .join(''),
      ),
    [dropped, count, space],
  );
  return (
    <G transform={`scale(${space.zoom})`}>
      <Defs>
        <HatchPattern id={`${id}out`} spacing={7} colour={roles.cold} weight={1.1} scale={1 / space.zoom} falling />
      </Defs>
      {/* two paths: a hole's scrap lies within the piece that falls later, and stays hatched */}
      {[scrap, kept].map((data, i) =>
        data === undefined || data === '' ? null : (
          <Path key={i} testID="run-dropped" d={data} fill={`url(#${id}out)`} />
        ),
      )}
    </G>
  );
});

/** Runs that are whole. */
const CutRuns = memo(function CutRuns({
  space,
  timeline,
  run,
}: Pick<RunLayerProps, 'space' | 'timeline'> & { run: number }) {
  const data = useMemo(
    () =>
      timeline.runs
        .slice(0, run)
        .map(({ segments }) => space.write(segments))
        .join(''),
    [timeline, run, space],
  );
  return (
    <G transform={`scale(${space.zoom})`}>
      <Heavy data={data} />
    </G>
  );
});

/** The whole chunks of the run that is being cut. */
const CutChunks = memo(function CutChunks({
  space,
  timeline,
  run,
  chunks,
}: Pick<RunLayerProps, 'space' | 'timeline'> & { run: number; chunks: number }) {
  const data = useMemo(
    () => space.write(timeline.runs[run]?.segments.slice(0, chunks * chunk) ?? []),
    [timeline, run, chunks, space],
  );
  return (
    <G transform={`scale(${space.zoom})`}>
      <Heavy data={data} />
    </G>
  );
});

/** From a segment on up to the head. */
function headData(
  space: DrawingSpace,
  { runs }: PlateClock,
  { run, segment, share, phase }: ClockMoment,
  from: number,
) {
  if (phase === 'rapid' || phase === 'pierce') return '';
  const all = runs[run]?.segments ?? [];
  const last = all[segment];
  const cut = all.slice(from, segment);
  return space.write(last && share > 0 ? [...cut, share < 1 ? segmentPart(last, 0, share) : last] : cut);
}

function Heavy({ data }: { data: string }) {
  if (data === '') return null;
  return (
    <Path
      testID="run-cut"
      d={data}
      fill="none"
      stroke={roles.ink}
      strokeWidth={5}
      strokeLinecap="round"
      strokeLinejoin="round"
      vectorEffect="non-scaling-stroke"
    />
  );
}

/** A ring with a cross through it; the beam's dot within while it is on. */
function Head({ space, moment: { at, phase } }: { space: DrawingSpace; moment: ClockMoment }) {
  const { x, y } = space.at(at);
  return (
    <G testID="run-head" transform={`translate(${x} ${y})`}>
      <Path d="M-18 0H-8M8 0H18M0 -18V-8M0 8V18" stroke={roles.ember} strokeWidth={2} />
      <Circle r={9} fill="none" stroke={roles.ember} strokeWidth={2.4} />
      {(phase === 'cut' || phase === 'pierce') && <Circle r={4} fill={roles.ember} />}
    </G>
  );
}

/** How many have dropped out by a time. */
export function countBefore(dropped: readonly Dropped[], time: number): number {
  let count = 0;
  while ((dropped[count]?.time ?? Infinity) <= time) count += 1;
  return count;
}
