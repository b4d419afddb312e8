import { plateField, type PlateField, type PlateQuestion, type PlateShape } from '@/strategy/heat/plate/index.ts';
import { diffusivity, midZoneProperties } from '@/strategy/heat/properties.ts';
import { heatOfClock, plateClock, type PlateDrive } from '@/strategy/motion/index.ts';
import type { CutPath } from '@/strategy/path/cut-path.ts';
import type { HeatFrame, PlateHeat } from './heat-field.ts';

/** What the heat of a cut follows from. */
export type HeatAsked = {
  readonly path: CutPath;
  readonly cutting: PlateDrive & {
    readonly heatIntoPlate: number;
    readonly pierceHeat: number | null;
    readonly lossCoefficient: number;
  };
  readonly plate: PlateQuestion['plate'];
  readonly shape: PlateShape | null;
  readonly thickness: number; // m
  readonly plateTemperature: number; // K
};

/** What the worker says: how far it is, the answer, or why the question has none. */
export type HeatSaid =
  | { readonly kind: 'progress'; readonly share: number }
  | { readonly kind: 'done'; readonly heat: PlateHeat }
  | { readonly kind: 'refused'; readonly why: string };

/** Works out the plate's heat through a cut; says how far it is and, last, what came of it. */
export function heatAnswer(asked: HeatAsked, say: (said: HeatSaid) => void): void {
  try {
    say({ kind: 'done', heat: plateHeat(asked, (share) => say({ kind: 'progress', share })) });
  } catch (error) {
    say({ kind: 'refused', why: error instanceof Error ? error.message : String(error) });
  }
}

/** Temperatures that are sent at most: 40 MB. */
const mostValues = 1e7;
/** m; larger where the frames of a long cut would be too many. */
const usualCell = 0.01;

function plateHeat(
  { path, cutting, plate, shape, thickness, plateTemperature }: HeatAsked,
  progress: (share: number) => void,
) {
  const clock = plateClock(path, cutting);
  const { heatIntoPlate, pierceHeat, lossCoefficient } = cutting;
  const { heat, pierces } = heatOfClock(clock, { heatIntoPlate, pierceHeat: pierceHeat ?? 0 });
  const field = plateField(
    {
      plate,
      ...(shape ? { shape } : {}),
      thickness,
      plateTemperature,
      lossCoefficient,
      heat,
      pierces,
      until: clock.duration,
      moments: Infinity,
      ...cellFor(plate, clock.duration),
    },
    (share) => {
      progress(share);
      return undefined;
    },
  );
  const { minX, minY, cellX, cellY, nx, ny } = field.grid;
  return {
    raster: { x: minX + cellX / 2, y: minY + cellY / 2, dx: cellX, dy: cellY, columns: nx, rows: ny },
    frames: framesOf(field),
    heat,
    pierces: pierces.map((one) => ({ ...one, heat: one.heat / thickness })),
    properties: midZoneProperties,
    plateTemperature,
  };
}

/** A cell with which as many frames as heat needs to come onto the raster stay within what is sent; the field's own choice where that does. */
function cellFor(plate: PlateQuestion['plate'], duration: number): { cell?: number } {
  const area = (plate.maxX - plate.minX) * (plate.maxY - plate.minY);
  const alpha = diffusivity(midZoneProperties);
  // cells × moments = area/cell² × duration·α/cell²
  const values = (cell: number) => (area * duration * alpha) / cell ** 4;
  return values(usualCell) > mostValues ? { cell: usualCell * (values(usualCell) / mostValues) ** 0.25 } : {};
}

/** As few frames as come no further apart than heat is old when it comes onto the raster. */
function framesOf(field: PlateField): HeatFrame[] {
  const { times } = field;
  const frames: HeatFrame[] = [];
  const first = field.settledFrame(0);
  const age = (times[0] ?? 0) - first.since;
  let taken = -Infinity;
  times.forEach((time, i) => {
    const next = times[i + 1];
    if (next !== undefined && next - taken <= age * (1 + 1e-9)) return;
    frames.push({ time, ...field.settledFrame(i) });
    taken = time;
  });
  return frames;
}

globalThis.onmessage = ({ data }: MessageEvent<HeatAsked>) =>
  heatAnswer(data, (said) => globalThis.postMessage(said, { transfer: transfersOf(said) }));

/** What is handed over without being copied. */
const transfersOf = (said: HeatSaid): Transferable[] =>
  said.kind === 'done' ? said.heat.frames.map(({ temperatures }) => temperatures.buffer) : [];
