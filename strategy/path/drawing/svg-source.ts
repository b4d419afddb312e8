import type { Affine } from './affine.ts';
import { affineCompose, affinePoint, identity } from './affine.ts';
import type { Shape } from './shape.ts';
import { shapeMap } from './shape.ts';
import type { DrawnPath, Source } from './source.ts';
import { entityCounter, Notes } from './source.ts';
import { shapeNames, svgOutline } from './svg-shapes.ts';
import type { SvgStyle } from './svg-style.ts';
import { firstStyle, styleOf, styleSheet } from './svg-style.ts';
import type { SvgNode } from './svg-tree.ts';
import { svgName, svgTree } from './svg-tree.ts';
import type { Viewport } from './svg-values.ts';
import { svgLength, svgPixels, svgTransform, viewBoxMap } from './svg-values.ts';
import type { DrawingUnit } from './unit.ts';
import { unitLength } from './unit.ts';

/** The layer that a rectangle as large as the page is put on: left out unless it is asked for. */
export const pageLayer = 'page rectangle';

/** Uses within uses. */
const deepestUse = 16;
/** Elements whose content is drawn in place. */
const groups: ReadonlySet<string> = new Set(['g', 'a', 'switch', 'svg']);
/** Elements that are never drawn where they stand, and say nothing about the part. */
const silent: ReadonlySet<string> = new Set([
  'defs',
  'symbol',
  'clipPath',
  'mask',
  'pattern',
  'marker',
  'linearGradient',
  'radialGradient',
  'filter',
  'style',
  'metadata',
  'title',
  'desc',
  'namedview',
  'script',
]);

/**
 * What an SVG draws: y turned upwards, in metres. A file that states its size in mm, cm, inches or points has it; pixels count 96 to the inch and are asked about. A
 * unit that is given stands for the one it states. Throws DrawingRefusal with a sentence and a place.
 */
export function svgSource(bytes: Uint8Array, given: DrawingUnit | undefined): Source {
  const { root, cutShort, entities } = svgTree(bytes);
  const notes = new Notes();
  if (cutShort) notes.leave('end of the file (it stops before its last element is ended)', null);
  if (entities) notes.leave('entities of the document type, which are never resolved', null);

  const stated = statedUnit(root);
  const unit = given ?? stated.unit;
  const scale = (unitLength.px * unitLength[unit]) / unitLength[stated.unit];
  const page = pageOf(root);
  const { map, inner } = viewBoxMap(root.attributes.viewBox, root.attributes.preserveAspectRatio, page);
  const toMetres: Affine = { a: scale, b: 0, c: 0, d: -scale, e: 0, f: page.height * scale };

  const reader = new Reader(root, notes);
  reader.whole(affineCompose(toMetres, map), inner);
  const size = { width: page.width * scale, height: page.height * scale };
  return {
    paths: reader.paths.map((path) => (isPage(path, size, reader) ? { ...path, layer: pageLayer } : path)),
    notes,
    hiddenLayers: new Set([pageLayer]),
    unit,
    unitDoubt: stated.doubt,
    counts: Object.fromEntries(reader.counts),
  };
}

/** Unit the file's size is stated in. Points, picas and the like are fixed lengths and count as millimetres. */
function statedUnit({ attributes }: SvgNode): { unit: DrawingUnit; doubt: string | null } {
  const unit = (svgLength(attributes.width) ?? svgLength(attributes.height))?.unit ?? '';
  if (unit === 'in') return { unit: 'inch', doubt: null };
  if (unit === 'cm') return { unit: 'cm', doubt: null };
  if (['mm', 'pt', 'pc', 'q'].includes(unit)) return { unit: 'mm', doubt: null };
  return { unit: 'px', doubt: 'the picture states its size in pixels only, of which 96 make an inch by the standard' };
}

/** Width and height in pixels: as stated, otherwise as the view box says. */
function pageOf({ attributes }: SvgNode): Viewport {
  const { inner } = viewBoxMap(attributes.viewBox, 'none', { width: 300, height: 150 });
  const width = svgPixels(attributes.width, inner.width);
  const height = svgPixels(attributes.height, inner.height);
  const share = inner.height / inner.width;
  // where one is missing the other and the view box give it
  return {
    width: width ?? (height === null ? inner.width : height / share),
    height: height ?? (width === null ? inner.height : width * share),
  };
}

type SvgPath = DrawnPath & { readonly painted: boolean };

class Reader {
  readonly paths: SvgPath[] = [];
  readonly counts = new Map<string, number>();
  readonly #root: SvgNode;
  readonly #notes: Notes;
  readonly #byId = new Map<string, SvgNode>();
  readonly #sheet;
  readonly #count = entityCounter();

  constructor(root: SvgNode, notes: Notes) {
    this.#root = root;
    this.#notes = notes;
    const styles: string[] = [];
    const nodes = [root];
    for (let node = nodes.pop(); node; node = nodes.pop()) {
      const { id } = node.attributes;
      if (id !== undefined && !this.#byId.has(id)) this.#byId.set(id, node);
      if (node.name === 'style') styles.push(node.text);
      for (const child of node.children) nodes.push(child);
    }
    this.#sheet = styleSheet(styles.reverse());
  }

  whole(map: Affine, port: Viewport): void {
    const style = styleOf(this.#root, firstStyle, this.#sheet);
    if (style.shown) this.content(this.#root, map, port, style, null);
    else this.#notes.leave('picture that is not displayed', null);
  }

  content(node: SvgNode, map: Affine, port: Viewport, style: SvgStyle, layer: string | null, uses = 0): void {
    for (const child of node.children) this.element(child, map, port, style, layer, uses);
  }

  element(node: SvgNode, outer: Affine, port: Viewport, around: SvgStyle, layer: string | null, uses: number): void {
    if (silent.has(node.name)) {
      if (node.name === 'script') this.#notes.leave('script, which is never run', null);
      return;
    }
    this.#count();
    const style = styleOf(node, around, this.#sheet);
    const own = svgTransform(node.attributes.transform);
    if (!own) this.#notes.leave(`${node.name} whose transform is not understood (line ${node.line})`, null);
    if (!own) return;
    const map = own === identity ? outer : affineCompose(outer, own);
    const shape = shapeNames.has(node.name);
    if (!style.shown) {
      if (shape) this.#notes.leave(`${node.name} that is not displayed`, placeOf(node, map, port));
      else if (groups.has(node.name)) this.#notes.leave('group that is not displayed', null);
      return;
    }
    if (node.attributes['clip-path'] !== undefined && node.attributes['clip-path'] !== 'none') {
      this.#notes.leave('clipping (what it hides is drawn whole)', null);
    }
    if (shape) this.#shape(node, map, port, style, layer);
    else if (node.name === 'use') this.#use(node, map, port, style, layer, uses);
    else if (node.name === 'svg') this.#inner(node, node.attributes, map, port, style, layer, uses);
    else if (groups.has(node.name)) this.content(node, map, port, style, layer ?? layerOf(node), uses);
    else this.#notes.leave(node.name, placeOf(node, map, port));
  }

  #shape(node: SvgNode, map: Affine, port: Viewport, style: SvgStyle, layer: string | null): void {
    const { name } = node;
    this.counts.set(name, (this.counts.get(name) ?? 0) + 1);
    const at = () => placeOf(node, map, port);
    if (!style.visible) {
      this.#notes.leave(`${name} that is not visible`, at());
      return;
    }
    const [painted, drawn] = [isPaint(style.fill), isPaint(style.stroke)];
    if (!painted && !drawn) {
      this.#notes.leave(`${name} without line and fill`, at());
      return;
    }
    const { runs, fault } = svgOutline(node, port);
    if (fault)
      this.#notes.mend(`${name} with an error in its data, read up to there (line ${node.line}: ${fault})`, at());
    const onLayer = layer ?? '0';
    for (const run of runs) {
      if (run.length === 0) continue;
      const shapes = run.map((one) => shapeMap(map, one));
      this.paths.push({ type: name, layer: onLayer, shapes, painted: painted && !drawn });
    }
    if (runs.every((run) => run.length === 0)) this.#notes.leave(`${name} without geometry`, at());
  }

  #use(node: SvgNode, map: Affine, port: Viewport, style: SvgStyle, layer: string | null, uses: number): void {
    const { href = '' } = node.attributes;
    const target = href.startsWith('#') ? this.#byId.get(href.slice(1)) : undefined;
    if (!target) {
      const what = href.startsWith('#')
        ? `missing "${svgName(href)}"`
        : 'something in another file, which is not fetched';
      this.#notes.leave(`use of ${what}`, placeOf(node, map, port));
      return;
    }
    if (uses >= deepestUse) {
      this.#notes.leave(`use of "${svgName(href)}" within itself, or too deep`, placeOf(node, map, port));
      return;
    }
    const x = svgPixels(node.attributes.x, port.width) ?? 0;
    const y = svgPixels(node.attributes.y, port.height) ?? 0;
    const moved = affineCompose(map, { ...identity, e: x, f: y });
    if (target.name !== 'symbol' && target.name !== 'svg') {
      this.element(target, moved, port, style, layer, uses + 1);
      return;
    }
    const { width = target.attributes.width, height = target.attributes.height } = node.attributes;
    const own = { ...target.attributes, ...(width && { width }), ...(height && { height }) };
    this.#inner(target, own, moved, port, styleOf(target, style, this.#sheet), layer, uses + 1);
  }

  /** An svg or a symbol within: a viewport of its own. */
  #inner(
    node: SvgNode,
    attributes: SvgNode['attributes'],
    map: Affine,
    port: Viewport,
    style: SvgStyle,
    layer: string | null,
    uses: number,
  ): void {
    const own = {
      width: svgPixels(attributes.width ?? '100%', port.width) ?? port.width,
      height: svgPixels(attributes.height ?? '100%', port.height) ?? port.height,
    };
    const x = node.name === 'svg' ? (svgPixels(attributes.x, port.width) ?? 0) : 0;
    const y = node.name === 'svg' ? (svgPixels(attributes.y, port.height) ?? 0) : 0;
    const { map: fitted, inner } = viewBoxMap(attributes.viewBox, attributes.preserveAspectRatio, own);
    this.content(
      node,
      affineCompose(map, affineCompose({ ...identity, e: x, f: y }, fitted)),
      inner,
      style,
      layer,
      uses,
    );
  }
}

const isPaint = (value: string): boolean => value !== 'none' && value !== 'transparent';

/** A group that drawing programs mark as a layer, with a label or at least an id. */
function layerOf({ attributes }: SvgNode): string | null {
  const { groupmode, label, id } = attributes;
  if (groupmode !== 'layer' && label === undefined) return null;
  return svgName(label ?? id ?? '') || null;
}

/** Where an element that is left out stands. */
function placeOf({ attributes }: SvgNode, map: Affine, port: Viewport) {
  const x = svgPixels(attributes.x ?? attributes.cx ?? attributes.x1, port.width);
  const y = svgPixels(attributes.y ?? attributes.cy ?? attributes.y1, port.height);
  return x === null || y === null ? null : affinePoint(map, { x, y });
}

/** Share of the page by which a rectangle may miss it. */
const pageSlack = 0.005;

/** Whether the path is a rectangle that only fills the page: paper, not part. One that is drawn as a line may be the part's own outline. */
function isPage({ shapes, painted }: SvgPath, page: Viewport, { paths }: Reader): boolean {
  if (!painted || paths.length < 2 || shapes.length < 4 || shapes.length > 5) return false;
  const lines = shapes.filter((shape): shape is Extract<Shape, { kind: 'line' }> => shape.kind === 'line');
  if (lines.length < shapes.length) return false;
  const square = lines.every(({ from, to }) => {
    const slack = 1e-6 * (page.width + page.height);
    return Math.abs(from.x - to.x) <= slack || Math.abs(from.y - to.y) <= slack;
  });
  const [xs, ys] = [lines.map(({ from }) => from.x), lines.map(({ from }) => from.y)];
  const near = (value: number, wanted: number) => Math.abs(value - wanted) <= pageSlack * (page.width + page.height);
  return (
    square &&
    near(Math.min(...xs), 0) &&
    near(Math.max(...xs), page.width) &&
    near(Math.min(...ys), 0) &&
    near(Math.max(...ys), page.height)
  );
}
