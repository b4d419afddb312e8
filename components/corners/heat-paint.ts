import { temperatureChannels } from '@/components/theme/temperature.ts';

type Colour = readonly [red: number, green: number, blue: number];

/** How temperatures become a picture. */
export type HeatPalette = {
  /** Of lines, in 0 to 255. */
  readonly ink: Colour;
  /** Temperatures, K, rising, each drawn as a line. */
  readonly levels: readonly number[];
  /** Above it, K, the picture is hatched. */
  readonly limit: number;
};

const zeroCelsius = 273.15;
/** Hottest that is told apart, °C. */
const hottest = 1400;
/** From cold steel, which leaves the paper as it is, to full colour where the temper colours begin, °C. */
const clear = 20;
const full = 225;

/** Red, green, blue and opacity for each whole °C from 0. */
const table = (() => {
  const entries = new Uint8ClampedArray(4 * (hottest + 1));
  for (let celsius = 0; celsius <= hottest; celsius++) {
    const opacity = Math.min(1, Math.max(0, (celsius - clear) / (full - clear)));
    // cold steel is light: drawn darker on the way to its first colour, so that a warm plate is seen on paper
    const channels = temperatureChannels(celsius + zeroCelsius).map((value) => value * (0.62 + 0.38 * opacity));
    entries.set([...channels, 235 * opacity], 4 * celsius);
  }
  return entries;
})();

/** The same, four bytes a colour. */
const colours = new Uint32Array(table.buffer);

/** Lines nearer to their neighbours than this can't be told apart and are left out, px; up to twice as far they are faint. */
const closest = 5;
/** Half the width of a line, px. */
const half = 0.8;
/** Between the lines of the hatch, px. */
const hatch = 6;

/**
 * The picture of temperatures, K, row by row, as red, green, blue and opacity: each in its colour on the one scale, a line at each level, hatched
 * where it is hotter than the limit. Line and hatch say the same as the colour for who doesn't see it.
 */
export function paintHeat(
  temperatures: Float32Array,
  columns: number,
  rows: number,
  { ink, levels, limit }: HeatPalette,
): Uint8ClampedArray<ArrayBuffer> {
  const picture = new Uint8ClampedArray(4 * columns * rows);
  // a point's four bytes at once: most points are a colour of the table as it is
  const points = new Uint32Array(picture.buffer);
  const { level, gap } = levelTable(levels);
  const widest = (half + 0.5) ** 2;
  for (let row = 0, at = 0; row < rows; row++) {
    const down = row + 1 < rows ? columns : -columns;
    for (let column = 0; column < columns; column++, at++) {
      const kelvin = temperatures[at] ?? 0;
      const celsius = kelvin <= zeroCelsius ? 0 : Math.min(hottest, (kelvin - zeroCelsius + 0.5) | 0);
      points[at] = colours[celsius] ?? 0;
      const across = (temperatures[column + 1 < columns ? at + 1 : at - 1] ?? kelvin) - kelvin;
      const downwards = (temperatures[at + down] ?? kelvin) - kelvin;
      const steep = across * across + downwards * downwards;
      const off = kelvin - (level[celsius] ?? Infinity);
      let drawn = 0;
      if (off * off < widest * steep) {
        const slope = Math.sqrt(steep);
        const line = Math.min(1, half + 0.5 - Math.abs(off) / slope);
        drawn = line * Math.min(1, Math.max(0, (gap[celsius] ?? 0) / (closest * slope) - 1));
      }
      if (kelvin > limit && (row + column) % hatch === 0) drawn = Math.max(drawn, 0.55);
      if (drawn === 0) continue;
      const byte = 4 * at;
      for (let channel = 0; channel < 3; channel++) {
        const colour = picture[byte + channel] ?? 0;
        picture[byte + channel] = colour + drawn * ((ink[channel] ?? 0) - colour);
      }
      const opacity = picture[byte + 3] ?? 0;
      picture[byte + 3] = opacity + drawn * (220 - opacity);
    }
  }
  return picture;
}

/** For each whole °C the level it is nearest to, K, and how far that level is from its neighbours, K. */
function levelTable(levels: readonly number[]): { level: Float64Array; gap: Float64Array } {
  const level = new Float64Array(hottest + 1).fill(Infinity);
  const gap = new Float64Array(hottest + 1);
  for (let celsius = 0; celsius <= hottest; celsius++) {
    const kelvin = celsius + zeroCelsius;
    let nearest = 0;
    levels.forEach((one, i) => {
      if (Math.abs(one - kelvin) < Math.abs((levels[nearest] ?? Infinity) - kelvin)) nearest = i;
    });
    const own = levels[nearest];
    if (own === undefined) continue;
    level[celsius] = own;
    gap[celsius] = Math.min(own - (levels[nearest - 1] ?? -Infinity), (levels[nearest + 1] ?? Infinity) - own);
  }
  return { level, gap };
}

/** A line's figure: at which temperature, K, and where on the picture, px. */
export type LevelLabel = { readonly kelvin: number; readonly column: number; readonly row: number };

/**
 * Where the figures of the lines may stand: on their line, as far from each other as the picture allows and no nearer than `apart` px; hotter lines choose
 * first, each at most twice. Looked for within `inside` alone, columns and rows.
 */
export function levelLabels(
  temperatures: Float32Array,
  columns: number,
  levels: readonly number[],
  inside: { readonly left: number; readonly top: number; readonly right: number; readonly bottom: number },
  apart: number,
): LevelLabel[] {
  const placed: LevelLabel[] = [];
  const stride = 3;
  for (const kelvin of [...levels].sort((a, b) => b - a)) {
    const room = Math.min(...levels.map((other) => (other === kelvin ? Infinity : Math.abs(other - kelvin))));
    const found: { column: number; row: number }[] = [];
    for (let row = inside.top; row < inside.bottom; row += stride) {
      for (let column = inside.left; column + stride < inside.right; column += stride) {
        const here = temperatures[row * columns + column] ?? 0;
        const there = temperatures[row * columns + column + stride] ?? 0;
        if (here < kelvin === there < kelvin) continue;
        // where lines crowd none is drawn: a figure would stand on nothing
        const below = temperatures[(row + stride) * columns + column] ?? here;
        if (room < 2 * closest * (Math.hypot(there - here, below - here) / stride)) continue;
        found.push({ column: column + (stride * (kelvin - here)) / (there - here), row });
      }
    }
    for (let times = 0; times < 2; times++) {
      let best: { column: number; row: number } | null = null;
      let far = apart;
      for (const place of found) {
        let nearest = Math.min(
          ...placed.map((one) => Math.hypot(one.column - place.column, 2 * (one.row - place.row))),
          4 * apart,
        );
        // a figure of the same line is wanted further off
        if (placed.some((one) => one.kelvin === kelvin)) nearest /= 2;
        if (nearest <= far) continue;
        far = nearest;
        best = place;
      }
      if (!best) break;
      placed.push({ kelvin, ...best });
    }
  }
  return placed;
}
