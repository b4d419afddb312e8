/** Group code and value. */
export type Tag = readonly [code: number, value: string | number];

type Layer = { readonly name: string; readonly off?: boolean; readonly frozen?: boolean };
type Block = { readonly name: string; readonly base?: readonly [number, number]; readonly entities: readonly (readonly Tag[])[] };

export type DxfDrawing = {
  /** $ACADVER; from AC1015 on entities carry handles and subclass marks, as newer writers put them. */
  readonly version?: 'AC1009' | 'AC1015' | 'AC1021' | 'AC1032';
  /** $INSUNITS, left out where the file doesn't say. */
  readonly units?: number;
  readonly layers?: readonly Layer[];
  readonly blocks?: readonly Block[];
  readonly entities: readonly (readonly Tag[])[];
  readonly lineEnd?: string;
  /** Without its EOF mark. */
  readonly endless?: boolean;
  /** One byte a character, as old writers have it, instead of UTF-8. */
  readonly oneByte?: boolean;
};

/** A DXF of our own drawing as bytes. */
export function makeDxf(drawing: DxfDrawing): Uint8Array {
  const { version = 'AC1009', units, layers = [], blocks = [], entities, lineEnd = '\n' } = drawing;
  const newer = version !== 'AC1009';
  let handle = 256;
  const written = (entity: readonly Tag[]): Tag[] => {
    const [type, ...rest] = entity;
    if (!type || !newer) return [...entity];
    return [type, [5, (handle++).toString(16).toUpperCase()], [330, '1F'], [100, 'AcDbEntity'], ...rest];
  };
  const section = (name: string, tags: readonly Tag[]): Tag[] => [[0, 'SECTION'], [2, name], ...tags, [0, 'ENDSEC']];
  const tags: Tag[] = [
    ...section('HEADER', [[9, '$ACADVER'], [1, version], ...(units === undefined ? [] : ([[9, '$INSUNITS'], [70, units]] as const))]),
    ...section('TABLES', [
      [0, 'TABLE'],
      [2, 'LAYER'],
      [70, layers.length],
      ...layers.flatMap(({ name, off, frozen }): Tag[] => [
        [0, 'LAYER'],
        [2, name],
        [70, frozen ? 1 : 0],
        [62, off ? -7 : 7],
        [6, 'CONTINUOUS'],
      ]),
      [0, 'ENDTAB'],
    ]),
    ...section(
      'BLOCKS',
      blocks.flatMap(({ name, base = [0, 0], entities: own }): Tag[] => [
        [0, 'BLOCK'],
        [8, '0'],
        [2, name],
        [70, 0],
        [10, base[0]],
        [20, base[1]],
        [30, 0],
        ...own.flatMap(written),
        [0, 'ENDBLK'],
        [8, '0'],
      ]),
    ),
    ...section('ENTITIES', entities.flatMap(written)),
    ...(drawing.endless ? [] : ([[0, 'EOF']] as const)),
  ];
  const text = tags.map(([code, value]) => `${String(code).padStart(3)}${lineEnd}${value}${lineEnd}`).join('');
  return drawing.oneByte ? Uint8Array.from(text, (c) => c.charCodeAt(0) & 255) : new TextEncoder().encode(text);
}

type XY = readonly [x: number, y: number];

export const line = (from: XY, to: XY, layer = 'CUT'): Tag[] => [
  [0, 'LINE'],
  [8, layer],
  [10, from[0]],
  [20, from[1]],
  [30, 0],
  [11, to[0]],
  [21, to[1]],
  [31, 0],
];

/** Lines from each corner to the next and back to the first. */
export const ring = (corners: readonly XY[], layer?: string): Tag[][] =>
  corners.map((corner, i) => line(corner, corners[(i + 1) % corners.length] ?? corner, layer));

export const rectangle = (x: number, y: number, width: number, height: number): XY[] => [
  [x, y],
  [x + width, y],
  [x + width, y + height],
  [x, y + height],
];

export const circle = (centre: XY, radius: number, layer = 'CUT', more: readonly Tag[] = []): Tag[] => [
  [0, 'CIRCLE'],
  [8, layer],
  [10, centre[0]],
  [20, centre[1]],
  [30, 0],
  [40, radius],
  ...more,
];

/** Degrees, counter-clockwise. */
export const arc = (centre: XY, radius: number, from: number, to: number, layer = 'CUT', more: readonly Tag[] = []): Tag[] => [
  ...circle(centre, radius, layer).map(([code, value]): Tag => (code === 0 ? [0, 'ARC'] : [code, value])),
  [50, from],
  [51, to],
  ...more,
];

/** Corners with their bulges. */
export const polyline = (
  corners: readonly (readonly [x: number, y: number, bulge?: number])[],
  closed = true,
  layer = 'CUT',
  more: readonly Tag[] = [],
): Tag[] => [
  [0, 'LWPOLYLINE'],
  [8, layer],
  [90, corners.length],
  [70, closed ? 1 : 0],
  ...corners.flatMap(([x, y, bulge]): Tag[] => [[10, x], [20, y], ...(bulge === undefined ? [] : ([[42, bulge]] as const))]),
  ...more,
];

/** A POLYLINE with its vertices, as R12 has it. */
export const oldPolyline = (corners: readonly (readonly [x: number, y: number, bulge?: number, flags?: number])[], flags = 1): Tag[] => [
  [0, 'POLYLINE'],
  [8, 'CUT'],
  [66, 1],
  [70, flags],
  ...corners.flatMap(([x, y, bulge = 0, own = 0]): Tag[] => [
    [0, 'VERTEX'],
    [8, 'CUT'],
    [10, x],
    [20, y],
    [30, 0],
    [42, bulge],
    [70, own],
  ]),
  [0, 'SEQEND'],
];

export const spline = (
  degree: number,
  knots: readonly number[],
  points: readonly XY[],
  more: readonly Tag[] = [],
): Tag[] => [
  [0, 'SPLINE'],
  [8, 'CUT'],
  [70, 8],
  [71, degree],
  [72, knots.length],
  [73, points.length],
  ...knots.map((knot): Tag => [40, knot]),
  ...more,
  ...points.flatMap(([x, y]): Tag[] => [
    [10, x],
    [20, y],
    [30, 0],
  ]),
];

export const insert = (block: string, at: XY, more: readonly Tag[] = [], layer = 'CUT'): Tag[] => [
  [0, 'INSERT'],
  [8, layer],
  [2, block],
  [10, at[0]],
  [20, at[1]],
  [30, 0],
  ...more,
];

export const text = (at: XY, words: string): Tag[] => [
  [0, 'TEXT'],
  [8, 'NOTES'],
  [10, at[0]],
  [20, at[1]],
  [30, 0],
  [40, 2.5],
  [1, words],
];
