import type { Point } from '../point.ts';
import { segmentFromBulge } from '../segment.ts';
import type { Affine } from './affine.ts';
import { affineCompose, affinePoint, identity, mirrorX } from './affine.ts';
import type { DxfDocument, RawEntity } from './document.ts';
import { tagNumber, tagText } from './document.ts';
import { fitSpline } from './fit-spline.ts';
import { knotsMended } from './knots.ts';
import { drawingLimits } from './limits.ts';
import { DrawingRefusal } from './refusal.ts';
import type { Shape } from './shape.ts';
import { shapeMap } from './shape.ts';
import type { DrawnPath, Notes } from './source.ts';
import { entityCounter } from './source.ts';
import type { Tags } from './tags.ts';

/** How often each entity type stands in the ENTITIES section, parts of polylines and inserts included. */
export function entityCounts(document: DxfDocument): Record<string, number> {
  const counts = new Map<string, number>();
  for (const { type } of document.entities) counts.set(type, (counts.get(type) ?? 0) + 1);
  return Object.fromEntries(counts);
}

/**
 * The geometry of a DXF, m, with `scale` m to its unit: inserts resolved, mirrored where the extrusion points down; what is no geometry of a part is
 * noted instead. Throws DrawingRefusal beyond the limits.
 */
export function drawnEntities(document: DxfDocument, scale: number, notes: Notes): DrawnPath[] {
  const { tags } = document;
  const paths: DrawnPath[] = [];
  const count = entityCounter();
  const entity = new Entity(tags);
  const nameOf = layerNames(document);

  const walk = (records: readonly RawEntity[], map: Affine, insertLayer: string | null, depth: number): void => {
    for (let i = 0; i < records.length; i++) {
      const record = records[i];
      if (!record || record.type === 'VERTEX' || record.type === 'SEQEND') continue;
      count();
      entity.take(record);
      const own = nameOf(entity.tagOf(8));
      const layer = own === '0' && insertLayer !== null ? insertLayer : own;
      if (entity.number(67, 0) === 1) notes.leave(`${record.type} on a paper-space sheet`, null);
      else if (entity.number(60, 0) === 1)
        notes.leave(`invisible ${record.type}`, affinePoint(map, placeOf(entity, record.type)));
      else if (record.type === 'LINE') paths.push({ type: 'LINE', layer, shapes: [lineShape(entity, map)] });
      else if (record.type === 'INSERT') insert(map, layer, depth);
      else {
        let next = i + 1;
        while (next < records.length && records[next]?.type === 'VERTEX') next++;
        const vertices = record.type === 'POLYLINE' ? records.slice(i + 1, next) : [];
        const found = shapesOf(tags, record, entity, vertices, map, notes);
        if (typeof found !== 'string') paths.push({ type: record.type, layer, shapes: found });
        else {
          // the point of an old polyline says nothing, its first vertex does
          if (vertices[0]) entity.take(vertices[0]);
          notes.leave(found, affinePoint(map, placeOf(entity, record.type)));
        }
      }
    }
  };

  const insert = (map: Affine, layer: string, depth: number): void => {
    const name = entity.text(2);
    const at = affinePoint(map, placeOf(entity, 'INSERT'));
    const block = document.blocks.get(name.toUpperCase());
    if (!block) {
      notes.leave(`INSERT of the missing block "${name}"`, at);
      return;
    }
    if (block.elsewhere) {
      notes.leave(`INSERT of "${name}", which lies in another file`, at);
      return;
    }
    if (depth >= drawingLimits.insertDepth) {
      throw new DrawingRefusal(
        `Block "${name}" is inserted within blocks more than ${drawingLimits.insertDepth} deep, or within itself. Explode it and export again.`,
      );
    }
    const plane = entity.plane();
    if (plane === null) {
      notes.leave('INSERT tilted out of the plane', at);
      return;
    }
    const columns = Math.max(1, Math.trunc(entity.number(70, 1)));
    const rows = Math.max(1, Math.trunc(entity.number(71, 1)));
    if (columns * rows > drawingLimits.entities)
      throw new DrawingRefusal(`Block "${name}" is inserted ${columns} × ${rows} times. Draw the part alone.`);
    const angle = radians(entity.number(50, 0));
    const [cos, sin] = [Math.cos(angle), Math.sin(angle)];
    const [sx, sy] = [entity.number(41, 1), entity.number(42, 1)];
    if (sx === 0 || sy === 0) {
      notes.leave(`INSERT of "${name}" with scale 0`, at);
      return;
    }
    const [stepX, stepY] = [entity.number(44, 0), entity.number(45, 0)];
    const [x, y] = [entity.number(10, 0), entity.number(20, 0)];
    const fromBase: Affine = { ...identity, e: -block.base.x, f: -block.base.y };
    const outer = affineCompose(map, plane);
    for (let row = 0; row < rows; row++) {
      for (let column = 0; column < columns; column++) {
        // an insert of nothing, thousands of times, is work too
        count();
        const [dx, dy] = [column * stepX, row * stepY];
        const placed: Affine = {
          a: cos * sx,
          b: sin * sx,
          c: -sin * sy,
          d: cos * sy,
          e: x + cos * dx - sin * dy,
          f: y + sin * dx + cos * dy,
        };
        walk(block.entities, affineCompose(outer, affineCompose(placed, fromBase)), layer, depth + 1);
      }
    }
  };

  walk(document.entities, { ...identity, a: scale, d: scale }, null, 0);
  return paths;
}

const radians = (degrees: number): number => (degrees * Math.PI) / 180;

/** Where an entity that is left out stands, in its own plane. */
function placeOf(entity: Entity, type: string): Point {
  // a hatch begins with its elevation; its second place is the first of its boundary
  const nth = type === 'HATCH' ? 1 : 0;
  return { x: entity.nth(10, nth) ?? 0, y: entity.nth(20, nth) ?? 0 };
}

/** Names of layers by the tag that holds them: one name whatever its case, as the table of layers writes it. */
function layerNames({ tags, layers }: DxfDocument): (tag: number) => string {
  const names = new Map(layers.map(({ name }) => [name.toUpperCase(), name]));
  const seen = new Map<string | number, string>();
  return (tag) => {
    if (tag < 0) return '0';
    const raw = tags.valueOf(tag);
    const known = seen.get(raw);
    if (known !== undefined) return known;
    const written = tagText(tags, tag) || '0';
    const key = written.toUpperCase();
    const name = names.get(key) ?? written;
    names.set(key, name);
    seen.set(raw, name);
    return name;
  };
}

/** Group codes below this are looked up by number. */
const knownCodes = 256;

/** The tags of one entity by group code; taken over by the next. */
class Entity {
  readonly #tags: Tags;
  readonly #first = new Int32Array(knownCodes).fill(-1);
  readonly #seen = new Int32Array(knownCodes);
  #count = 0;
  #from = 0;
  #end = 0;

  constructor(tags: Tags) {
    this.#tags = tags;
  }

  take({ first, end }: RawEntity): void {
    for (let k = 0; k < this.#count; k++) this.#first[this.#seen[k] ?? 0] = -1;
    this.#count = 0;
    this.#from = first;
    const { codes } = this.#tags;
    let i = first;
    // what follows from 1000 on belongs to applications
    for (; i < end && (codes[i] ?? 0) < 1000; i++) {
      const code = codes[i] ?? 0;
      if (code < 0 || code >= knownCodes || this.#first[code] !== -1) continue;
      this.#first[code] = i;
      this.#seen[this.#count++] = code;
    }
    this.#end = i;
  }

  /** First tag with the group code, or −1. */
  tagOf(code: number): number {
    return this.#first[code] ?? -1;
  }

  /** First value of the group code, or what is given for none. */
  number(code: number, otherwise: number): number {
    const i = this.#first[code] ?? -1;
    return i < 0 ? otherwise : tagNumber(this.#tags, i);
  }

  text(code: number): string {
    const i = this.#first[code] ?? -1;
    return i < 0 ? '' : tagText(this.#tags, i);
  }

  all(code: number): number[] {
    const found: number[] = [];
    if (this.tagOf(code) < 0) return found;
    for (let i = this.tagOf(code); i < this.#end; i++) {
      if (this.#tags.codes[i] === code) found.push(tagNumber(this.#tags, i));
    }
    return found;
  }

  /** The value of the group code after so many others, or null. */
  nth(code: number, skip: number): number | null {
    let left = skip;
    for (let i = this.#from; i < this.#end; i++) {
      if (this.#tags.codes[i] === code && left-- === 0) return tagNumber(this.#tags, i);
    }
    return null;
  }

  /** Map from the entity's own plane, or null when that is tilted. */
  plane(): Affine | null {
    if (this.tagOf(230) < 0 && this.tagOf(210) < 0 && this.tagOf(220) < 0) return identity;
    const [x, y, z] = [this.number(210, 0), this.number(220, 0), this.number(230, 1)];
    // no direction at all, as some writers leave it, is taken for up
    if (x === 0 && y === 0 && z === 0) return identity;
    if (Math.hypot(x, y) > 1e-6 * Math.hypot(x, y, z)) return null;
    return z < 0 ? mirrorX : identity;
  }
}

/** The commonest entity by far. Its places are the world's own, whatever its extrusion. */
const lineShape = (entity: Entity, map: Affine): Shape => ({
  kind: 'line',
  from: affinePoint(map, { x: entity.number(10, 0), y: entity.number(20, 0) }),
  to: affinePoint(map, { x: entity.number(11, 0), y: entity.number(21, 0) }),
});

/** Shapes of any other entity under the map, or what it is left out as. */
function shapesOf(
  tags: Tags,
  record: RawEntity,
  entity: Entity,
  vertices: readonly RawEntity[],
  map: Affine,
  notes: Notes,
): Shape[] | string {
  const point = (code: number): Point => ({ x: entity.number(code, 0), y: entity.number(code + 10, 0) });
  const inPlane = (shapes: readonly Shape[]): Shape[] | string => {
    const plane = entity.plane();
    if (plane === null) return `${record.type} tilted out of the plane`;
    const whole = plane === identity ? map : affineCompose(map, plane);
    return shapes.map((shape) => shapeMap(whole, shape));
  };
  const mapped = (shapes: readonly Shape[]): Shape[] => shapes.map((shape) => shapeMap(map, shape));
  switch (record.type) {
    case 'CIRCLE': {
      const radius = Math.abs(entity.number(40, 0));
      return radius > 0 ? inPlane([circular(point(10), radius, 0, 2 * Math.PI)]) : 'CIRCLE without radius';
    }
    case 'ARC': {
      const radius = Math.abs(entity.number(40, 0));
      const start = radians(entity.number(50, 0));
      return radius > 0
        ? inPlane([circular(point(10), radius, start, turnBetween(start, radians(entity.number(51, 360))))])
        : 'ARC without radius';
    }
    case 'ELLIPSE': {
      const plane = entity.plane();
      if (plane === null) return 'ELLIPSE tilted out of the plane';
      const u = point(11);
      const ratio = entity.number(40, 1) * (plane === mirrorX ? -1 : 1);
      if (Math.hypot(u.x, u.y) === 0 || ratio === 0) return 'ELLIPSE without axes';
      const start = entity.number(41, 0);
      const v = { x: -u.y * ratio, y: u.x * ratio };
      const sweep = turnBetween(start, entity.number(42, 2 * Math.PI));
      return mapped([{ kind: 'conic', centre: point(10), u, v, start, sweep }]);
    }
    case 'LWPOLYLINE':
      return inPlane(polylineShapes(lightVertices(tags, record), (entity.number(70, 0) & 1) === 1));
    case 'POLYLINE': {
      const flags = entity.number(70, 0);
      if ((flags & (16 | 64)) !== 0) return 'POLYLINE that is a mesh';
      const vertex = new Entity(tags);
      const points = vertices.flatMap((one) => {
        vertex.take(one);
        // bit 16 marks the control frame of a spline-fit polyline, which is not drawn
        return (vertex.number(70, 0) & 16) !== 0
          ? []
          : [{ x: vertex.number(10, 0), y: vertex.number(20, 0), bulge: vertex.number(42, 0) }];
      });
      tooMany(points.length);
      const shapes = polylineShapes(points, (flags & 1) === 1);
      return (flags & 8) !== 0 ? mapped(shapes) : inPlane(shapes);
    }
    case 'SPLINE': {
      const shapes = splineShapes(entity, (what) => notes.mend(what, affinePoint(map, placeOf(entity, 'SPLINE'))));
      return typeof shapes === 'string' ? shapes : mapped(shapes);
    }
    default:
      return record.type;
  }
}

const circular = (centre: Point, radius: number, start: number, sweep: number): Shape => ({
  kind: 'conic',
  centre,
  u: { x: radius, y: 0 },
  v: { x: 0, y: radius },
  start,
  sweep,
});

/** Counter-clockwise turn from one angle to another, rad, in (0, 2π]. */
function turnBetween(from: number, to: number): number {
  const full = 2 * Math.PI;
  const turn = (((to - from) % full) + full) % full;
  return turn < 1e-12 ? full : turn;
}

type Vertex = { x: number; y: number; bulge: number };

/** Vertices of an LWPOLYLINE: each group 10 begins one, whatever the order of what follows. */
function lightVertices(tags: Tags, { first, end }: RawEntity): Vertex[] {
  const points: Vertex[] = [];
  for (let i = first; i < end && (tags.codes[i] ?? 0) < 1000; i++) {
    const last = points.at(-1);
    if (tags.codes[i] === 10) points.push({ x: tagNumber(tags, i), y: 0, bulge: 0 });
    else if (tags.codes[i] === 20 && last) last.y = tagNumber(tags, i);
    else if (tags.codes[i] === 42 && last) last.bulge = tagNumber(tags, i);
  }
  tooMany(points.length);
  return points;
}

function tooMany(points: number): void {
  if (points > drawingLimits.points) {
    throw new DrawingRefusal(
      `One entity has ${points} points; at most ${drawingLimits.points} are read. Simplify it and export again.`,
    );
  }
}

function polylineShapes(points: readonly Vertex[], closed: boolean): Shape[] {
  const shapes: Shape[] = [];
  const last = closed ? points.length : points.length - 1;
  for (let i = 0; i < last; i++) {
    const a = points[i];
    const b = points[(i + 1) % points.length];
    if (!a || !b || (a.x === b.x && a.y === b.y)) continue;
    const segment = segmentFromBulge({ x: a.x, y: a.y }, { x: b.x, y: b.y }, a.bulge);
    shapes.push(
      segment.kind === 'line'
        ? { kind: 'line', from: segment.start, to: segment.end }
        : circular(segment.centre, segment.radius, segment.startAngle, segment.sweep),
    );
  }
  return shapes;
}

function splineShapes(entity: Entity, mend: (what: string) => void): Shape[] | string {
  const points = pointsOf(entity, 10);
  const fit = pointsOf(entity, 11);
  tooMany(Math.max(points.length, fit.length));
  const throughFit = (): Shape[] => {
    const tangent = (code: number): Point | null => {
      const [x, y] = [entity.number(code, 0), entity.number(code + 10, 0)];
      return Math.hypot(x, y) > 0 ? { x, y } : null;
    };
    return fitSpline(fit, { start: tangent(12), end: tangent(13), closed: (entity.number(70, 0) & 1) === 1 });
  };
  if (points.length === 0) return fit.length >= 2 ? throughFit() : 'SPLINE without points';
  const degree = entity.number(71, 3);
  const weights = entity.all(41);
  const sound =
    Number.isInteger(degree) &&
    degree >= 1 &&
    degree <= drawingLimits.splineDegree &&
    points.length > degree &&
    (weights.length === 0 || (weights.length === points.length && weights.every((w) => w > 0)));
  const knots = sound ? knotsMended(entity.all(40), points.length, degree) : null;
  if (knots) {
    if (knots.mended) mend(`SPLINE whose knots were ${knots.mended}`);
    return [
      {
        kind: 'spline',
        degree,
        knots: knots.knots,
        points,
        weights: weights.length > 0 ? weights : points.map(() => 1),
      },
    ];
  }
  if (fit.length >= 2) {
    mend('SPLINE whose knots are broken, drawn through its fit points');
    return throughFit();
  }
  return 'SPLINE whose knots, points and weights do not fit together';
}

function pointsOf(entity: Entity, code: number): Point[] {
  const ys = entity.all(code + 10);
  return entity.all(code).map((x, i) => ({ x, y: ys[i] ?? 0 }));
}
