import { Fragment } from 'react';
import { Line } from 'react-native-svg';
import { niceTicks } from '@/components/pierce/nice-ticks.ts';
import { letteringWidth } from '@/components/pierce/section-layout.ts';
import { Lettering } from '@/components/pierce/still-shapes.tsx';
import { temperatureColour } from '@/components/theme/temperature.ts';
import { roles } from '@/components/theme/roles.ts';
import { quantityFrom, quantityIn, type UnitSystem } from '@/strategy/units/index.ts';

/** Time from `first` to `last`, s, across, and temperature up to `hottest`, K, upwards, on a sheet of so many px. */
export type ChartSpan = {
  readonly width: number;
  readonly height: number;
  readonly first: number;
  readonly last: number;
  readonly hottest: number;
  readonly system: UnitSystem;
};

/** Room around the drawn range, px: figures to the left and below, a line's words above. */
const room = { left: 58, right: 14, top: 26, bottom: 46 } as const;

export type ChartSpace = ChartSpan & {
  readonly x: (seconds: number) => number;
  readonly y: (kelvin: number) => number;
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly bottom: number;
};

/** Where times and temperatures stand on the sheet, px; temperature begins at 0 of its own unit. */
export function chartSpace(span: ChartSpan): ChartSpace {
  const { width, height, first, last, hottest, system } = span;
  const [left, right, top, bottom] = [room.left, width - room.right, room.top, height - room.bottom];
  const coldest = quantityFrom(0, 'temperature', degrees(system));
  return {
    ...span,
    left,
    right,
    top,
    bottom,
    x: (seconds) => left + ((seconds - first) / Math.max(1e-9, last - first)) * (right - left),
    y: (kelvin) => bottom - ((kelvin - coldest) / Math.max(1e-9, hottest - coldest)) * (bottom - top),
  };
}

const degrees = (system: UnitSystem) => (system === 'metric' ? '°C' : '°F');

/** Past this a time is read in minutes, s. */
const longTime = 300;

/** Both axes with round figures, their units and what they are of; beside the temperatures the scale's own colours. */
export function ChartAxes({
  space,
  acrossLabel,
  upLabel,
}: {
  space: ChartSpace;
  acrossLabel: string;
  upLabel: string;
}) {
  const { x, y, left, right, top, bottom, first, last, hottest, system, width } = space;
  const unit = degrees(system);
  const temperatures = niceTicks(quantityIn(hottest, 'temperature', unit), (bottom - top) / 44);
  const minute = last - first > longTime ? 60 : 1;
  const times = niceTicks((last - Math.max(0, first)) / minute, Math.max(2, (right - left) / 78)).map(
    (tick) => tick * minute,
  );
  return (
    <>
      {temperatures.map((tick) => {
        const kelvin = quantityFrom(tick, 'temperature', unit);
        const at = y(kelvin);
        return (
          <Fragment key={tick}>
            <Line x1={left} x2={right} y1={at} y2={at} stroke={tick === 0 ? roles.ink : roles.rule} strokeWidth={1} />
            <Lettering x={left - 12} y={at + 5} anchor="end" figure>
              {String(tick)}
            </Lettering>
          </Fragment>
        );
      })}
      {temperatures.slice(1).map((tick, i) => {
        const [from, to] = [temperatures[i] ?? 0, tick].map((value) => quantityFrom(value, 'temperature', unit));
        return <ScaleBar key={tick} left={left - 7} from={from ?? 0} to={to ?? 0} y={y} />;
      })}
      {times.map((tick) => (
        <Fragment key={tick}>
          <Line x1={x(tick)} x2={x(tick)} y1={bottom} y2={bottom + 5} stroke={roles.softInk} strokeWidth={1} />
          <Lettering x={x(tick)} y={bottom + 20} anchor={x(tick) > width - 24 ? 'end' : 'middle'} figure>
            {String(Number((tick / minute).toPrecision(6)))}
          </Lettering>
        </Fragment>
      ))}
      <Lettering x={left} y={14} colour={roles.softInk}>
        {`${upLabel}, ${unit}`}
      </Lettering>
      <Lettering x={right} y={bottom + 40} anchor="end" colour={roles.softInk}>
        {`${acrossLabel}, ${minute === 60 ? 'min' : 's'}`}
      </Lettering>
    </>
  );
}

const bands = 6;

/** A narrow bar in the colours of the temperatures beside it. */
function ScaleBar({ left, from, to, y }: { left: number; from: number; to: number; y: (kelvin: number) => number }) {
  return (
    <>
      {Array.from({ length: bands }, (_, i) => {
        const [low, high] = [i, i + 1].map((part) => from + ((to - from) * part) / bands);
        const middle = ((low ?? 0) + (high ?? 0)) / 2;
        return (
          <Line
            key={i}
            x1={left}
            x2={left}
            y1={y(low ?? 0)}
            y2={y(high ?? 0)}
            stroke={temperatureColour(middle)}
            strokeWidth={5}
          />
        );
      })}
    </>
  );
}

/** The limit: a heavy dashed line; what it is stands above the chart, out of the way of all that is drawn. */
export function LimitLine({ space, kelvin, words }: { space: ChartSpace; kelvin: number; words: string }) {
  const { left, right, y, top } = space;
  const at = y(kelvin);
  if (at < top) return null;
  const dashed = { stroke: roles.hot, strokeWidth: 2, strokeDasharray: '10 4' };
  return (
    <>
      <Line x1={left} x2={right} y1={at} y2={at} {...dashed} />
      <Line x1={right - letteringWidth(words) - 42} x2={right - letteringWidth(words) - 6} y1={9} y2={9} {...dashed} />
      <Lettering x={right} y={14} anchor="end" colour={roles.hot}>
        {words}
      </Lettering>
    </>
  );
}
