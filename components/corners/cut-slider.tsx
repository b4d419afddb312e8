import { useRef, type KeyboardEvent } from 'react';
import { StyleSheet, View, type PointerEvent } from 'react-native';
import Svg, { Circle, Path } from 'react-native-svg';
import { useWidth } from '@/components/parts/use-width.ts';
import { runText } from '@/components/text/corner-preview.ts';
import { roles } from '@/components/theme/roles.ts';
import { webStyle } from '@/components/theme/web-style.ts';
import type { PlateClock } from '@/strategy/motion/index.ts';
import { useRunTime, type RunClock } from './run-clock.ts';

const height = 56;
const edge = 14;
/** More contours than this are no ticks but a grey bar. */
const mostTicks = 80;

/** Time of the cut, set by finger, mouse and keys; each contour's beginning is a tick. */
export function CutSlider({ timeline, clock, words }: { timeline: PlateClock; clock: RunClock; words: string }) {
  const time = useRunTime(clock);
  const track = useRef<HTMLElement>(null);
  const width = useWidth(track, 320);
  const held = useRef<number | null>(null);
  const { duration, runs } = timeline;
  const long = Math.max(1, width - 2 * edge);
  const xOf = (seconds: number) => edge + (duration > 0 ? seconds / duration : 0) * long;
  const setTo = (seconds: number) => clock.set(Math.min(duration, Math.max(0, seconds)));
  const follow = (clientX: number) => {
    const left = track.current?.getBoundingClientRect().left ?? 0;
    setTo(((clientX - left - edge) / long) * duration);
  };

  const down = ({ nativeEvent: { button, pointerId, clientX } }: PointerEvent) => {
    if (button !== 0 || held.current !== null) return;
    held.current = pointerId;
    track.current?.setPointerCapture(pointerId);
    follow(clientX);
  };
  const move = ({ nativeEvent: { pointerId, clientX } }: PointerEvent) => {
    if (held.current === pointerId) follow(clientX);
  };
  const up = () => {
    held.current = null;
  };
  const key = (event: KeyboardEvent<HTMLElement>) => {
    if (event.ctrlKey || event.metaKey || event.altKey) return;
    const next = keyed(event.key, event.shiftKey ? 10 : 1, time, timeline);
    if (next === null) return;
    event.preventDefault();
    setTo(next);
  };
  const ticks = runs.length <= mostTicks ? runs.map(({ start }) => `M${xOf(start)} 17V25`).join('') : '';

  return (
    <View
      ref={(host: unknown) => {
        track.current = host instanceof HTMLElement ? host : null;
      }}
      role="slider"
      tabIndex={0}
      aria-label={runText.slider}
      aria-orientation="horizontal"
      aria-valuemin={0}
      aria-valuemax={duration}
      aria-valuenow={time}
      aria-valuetext={words}
      onPointerDown={down}
      onPointerMove={move}
      onPointerUp={up}
      onPointerCancel={up}
      onKeyDown={key}
      style={styles.track}
    >
      <Svg width="100%" height={height} aria-hidden>
        <Path d={`M${edge} 28H${edge + long}`} stroke={roles.softInk} strokeWidth={2} />
        <Path d={ticks} stroke={roles.softInk} strokeWidth={1.4} />
        <Path d={`M${edge} 28H${xOf(time)}`} stroke={roles.ink} strokeWidth={5} />
        <Circle cx={xOf(time)} cy={28} r={12} fill={roles.ember} stroke={roles.sheet} strokeWidth={2} />
      </Svg>
    </View>
  );
}

function keyed(key: string, step: number, time: number, { duration, runs }: PlateClock): number | null {
  switch (key) {
    case 'ArrowRight':
    case 'ArrowUp':
      return time + step;
    case 'ArrowLeft':
    case 'ArrowDown':
      return time - step;
    case 'PageUp':
      return runs.find(({ start }) => start > time + 1e-6)?.start ?? duration;
    case 'PageDown':
      return runs.findLast(({ start }) => start < time - 1e-6)?.start ?? 0;
    case 'Home':
      return 0;
    case 'End':
      return duration;
    default:
      return null;
  }
}

const styles = StyleSheet.create({
  track: { height, width: '100%', ...webStyle({ touchAction: 'pan-y', cursor: 'pointer' }) },
});
