import type { Point } from '../point.ts';
import { segmentFromBulge } from '../segment.ts';
import type { Affine } from './affine.ts';
import { affineCompose, identity, mirrorX } from './affine.ts';
import type { DxfDocument, RawEntity } from './document.ts';
import { tagNumber, tagText } from './document.ts';
import { drawingLimits } from './limits.ts';
import { DrawingRefusal } from './refusal.ts';
import type { Shape } from './shape.ts';
import { shapeMap } from './shape.ts';

/** The geometry of one entity: connected shapes in order, in the file's units. */
export type EntityPath = { readonly type: string; readonly layer: string; readonly shapes: readonly Shape[] };

/** Everything drawn, and what was left out with how often. */
export type Drawn = { readonly paths: readonly EntityPath[]; readonly leftOut: ReadonlyMap<string, number> };

/** How often each entity type stands in the ENTITIES section, parts of polylines and inserts included. */
export function entityCounts(document: DxfDocument): Record<string, number> {
  const counts: Record<string, number> = {};
  for (const { type } of document.entities) counts[type] = (counts[type] ?? 0) + 1;
  return counts;
}

/**
 * The geometry of a DXF in its own units, inserts resolved, mirrored where the extrusion points down; what is no geometry of a part is counted
 * instead. Throws DrawingRefusal beyond the limits.
 */
export function drawnEntities(document: DxfDocument): Drawn {
  const paths: EntityPath[] = [];
  const leftOut = new Map<string, number>();
  const skip = (what: string) => leftOut.set(what, (leftOut.get(what) ?? 0) + 1);

  let visited = 0;
  const walk = (records: readonly RawEntity[], map: Affine, insertLayer: string | null, depth: number): void => {
    for (let i = 0; i < records.length; i++) {
      const record = records[i];
      if (!record || record.type === 'VERTEX' || record.type === 'SEQEND') continue;
      if (++visited > drawingLimits.entities) {
        throw new DrawingRefusal(
          `The drawing holds more than ${drawingLimits.entities} entities once its inserts are resolved. Draw the part alone.`,
        );
      }
      const entity = entityOf(document, record);
      const layer = entity.layer === '0' && insertLayer !== null ? insertLayer : entity.layer;
      if (entity.paperSpace) skip(`${record.type} on a paper-space sheet`);
      else if (entity.invisible) skip(`invisible ${record.type}`);
      else if (record.type === 'INSERT') insert(entity, map, layer, depth);
      else {
        let next = i + 1;
        while (next < records.length && records[next]?.type === 'VERTEX') next++;
        const found = shapesOf(document, record, entity, records.slice(i + 1, next));
        if (typeof found === 'string') skip(found);
        else paths.push({ type: record.type, layer, shapes: found.map((shape) => shapeMap(map, shape)) });
      }
    }
  };

  const insert = (entity: Entity, map: Affine, layer: string, depth: number): void => {
    const name = entity.text(2);
    const block = document.blocks.get(name.toUpperCase());
    if (!block) {
      skip(`INSERT of the missing block "${name}"`);
      return;
    }
    if (depth >= drawingLimits.insertDepth) {
      throw new DrawingRefusal(
        `Block "${name}" is inserted within blocks more than ${drawingLimits.insertDepth} deep, or within itself. Explode it and export again.`,
      );
    }
    const plane = entity.plane();
    if (plane === null) {
      skip('INSERT tilted out of the plane');
      return;
    }
    const columns = Math.max(1, entity.number(70, 1));
    const rows = Math.max(1, entity.number(71, 1));
    if (columns * rows > drawingLimits.entities)
      throw new DrawingRefusal(`Block "${name}" is inserted ${columns} × ${rows} times. Draw the part alone.`);
    const angle = (entity.number(50, 0) * Math.PI) / 180;
    const [cos, sin] = [Math.cos(angle), Math.sin(angle)];
    const [sx, sy] = [entity.number(41, 1), entity.number(42, 1)];
    for (let row = 0; row < rows; row++) {
      for (let column = 0; column < columns; column++) {
        const dx = column * entity.number(44, 0);
        const dy = row * entity.number(45, 0);
        const placed: Affine = {
          a: cos * sx,
          b: sin * sx,
          c: -sin * sy,
          d: cos * sy,
          e: entity.number(10, 0) + cos * dx - sin * dy,
          f: entity.number(20, 0) + sin * dx + cos * dy,
        };
        const fromBase: Affine = { ...identity, e: -block.base.x, f: -block.base.y };
        walk(
          block.entities,
          affineCompose(map, affineCompose(plane, affineCompose(placed, fromBase))),
          layer,
          depth + 1,
        );
      }
    }
  };

  walk(document.entities, identity, null, 0);
  return { paths, leftOut };
}

/** An entity's tags by group code, read when asked for. */
type Entity = {
  readonly layer: string;
  readonly paperSpace: boolean;
  readonly invisible: boolean;
  /** First value of the group code, or what is given for none. */
  readonly number: (code: number, otherwise: number) => number;
  readonly text: (code: number) => string;
  readonly all: (code: number) => number[];
  /** Map from the entity's own plane, or null when that is tilted. */
  readonly plane: () => Affine | null;
};

function entityOf({ tags }: DxfDocument, { first, end }: RawEntity): Entity {
  const find = (code: number) => {
    for (let i = first; i < end; i++) {
      // what follows belongs to applications
      if ((tags.codes[i] ?? 0) >= 1000) return -1;
      if (tags.codes[i] === code) return i;
    }
    return -1;
  };
  const number = (code: number, otherwise: number) => {
    const i = find(code);
    return i < 0 ? otherwise : tagNumber(tags, i);
  };
  const text = (code: number) => {
    const i = find(code);
    return i < 0 ? '' : tagText(tags, i);
  };
  const all = (code: number) => {
    const found: number[] = [];
    for (let i = first; i < end && (tags.codes[i] ?? 0) < 1000; i++)
      if (tags.codes[i] === code) found.push(tagNumber(tags, i));
    return found;
  };
  return {
    layer: text(8) || '0',
    paperSpace: number(67, 0) === 1,
    invisible: number(60, 0) === 1,
    number,
    text,
    all,
    plane: () => {
      const [x, y, z] = [number(210, 0), number(220, 0), number(230, 1)];
      if (Math.hypot(x, y) > 1e-6 * Math.hypot(x, y, z)) return null;
      return z < 0 ? mirrorX : identity;
    },
  };
}

/** Shapes of an entity in the coordinates of its block, or what it is left out as. */
function shapesOf(
  document: DxfDocument,
  record: RawEntity,
  entity: Entity,
  vertices: readonly RawEntity[],
): Shape[] | string {
  const { number } = entity;
  const point = (code: number): Point => ({ x: number(code, 0), y: number(code + 10, 0) });
  const radians = (code: number, otherwise: number) => (number(code, otherwise) * Math.PI) / 180;
  const inPlane = (shapes: Shape[]): Shape[] | string => {
    const plane = entity.plane();
    return plane === null ? `${record.type} tilted out of the plane` : shapes.map((shape) => shapeMap(plane, shape));
  };
  switch (record.type) {
    case 'LINE':
      return [{ kind: 'line', from: point(10), to: point(11) }];
    case 'CIRCLE': {
      const radius = Math.abs(number(40, 0));
      return radius > 0 ? inPlane([circular(point(10), radius, 0, 2 * Math.PI)]) : 'CIRCLE without radius';
    }
    case 'ARC': {
      const radius = Math.abs(number(40, 0));
      const start = radians(50, 0);
      return radius > 0
        ? inPlane([circular(point(10), radius, start, turnBetween(start, radians(51, 360)))])
        : 'ARC without radius';
    }
    case 'ELLIPSE': {
      const plane = entity.plane();
      if (plane === null) return 'ELLIPSE tilted out of the plane';
      const u = point(11);
      const ratio = number(40, 1) * (plane === mirrorX ? -1 : 1);
      if (Math.hypot(u.x, u.y) === 0 || ratio === 0) return 'ELLIPSE without axes';
      const start = number(41, 0);
      const v = { x: -u.y * ratio, y: u.x * ratio };
      return [{ kind: 'conic', centre: point(10), u, v, start, sweep: turnBetween(start, number(42, 2 * Math.PI)) }];
    }
    case 'LWPOLYLINE':
      return inPlane(polylineShapes(lightVertices(document, record), (number(70, 0) & 1) === 1));
    case 'POLYLINE': {
      const flags = number(70, 0);
      if ((flags & (16 | 64)) !== 0) return 'POLYLINE that is a mesh';
      const points = vertices.flatMap((vertex) => {
        const v = entityOf(document, vertex);
        // bit 16 marks the control frame of a spline-fit polyline, which is not drawn
        return (v.number(70, 0) & 16) !== 0 ? [] : [{ x: v.number(10, 0), y: v.number(20, 0), bulge: v.number(42, 0) }];
      });
      tooMany(points.length);
      const shapes = polylineShapes(points, (flags & 1) === 1);
      return (flags & 8) !== 0 ? shapes : inPlane(shapes);
    }
    case 'SPLINE':
      return splineShape(entity);
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
function lightVertices({ tags }: DxfDocument, { first, end }: RawEntity): Vertex[] {
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

function splineShape(entity: Entity): Shape[] | string {
  const degree = entity.number(71, 3);
  const knots = entity.all(40);
  const xs = entity.all(10);
  const ys = entity.all(20);
  if (xs.length === 0) return entity.all(11).length > 0 ? 'SPLINE given by fit points only' : 'SPLINE without points';
  tooMany(xs.length);
  const points = xs.map((x, i) => ({ x, y: ys[i] ?? 0 }));
  const weights = entity.all(41);
  const rising = knots.every((knot, i) => i === 0 || knot >= (knots[i - 1] ?? knot));
  const complete =
    Number.isInteger(degree) &&
    degree >= 1 &&
    degree <= drawingLimits.splineDegree &&
    points.length > degree &&
    knots.length === points.length + degree + 1 &&
    rising &&
    (knots[points.length] ?? 0) > (knots[degree] ?? 0) &&
    (weights.length === 0 || (weights.length === points.length && weights.every((w) => w > 0)));
  if (!complete) return 'SPLINE whose knots, points and weights do not fit together';
  return [{ kind: 'spline', degree, knots, points, weights: weights.length > 0 ? weights : points.map(() => 1) }];
}
