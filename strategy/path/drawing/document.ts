import { nameDecode } from './bytes.ts';
import { drawingLimits } from './limits.ts';
import { DrawingRefusal } from './refusal.ts';
import type { Tags } from './tags.ts';

/** One entity: its type and the range of its tags. */
export type RawEntity = { readonly type: string; readonly first: number; readonly end: number };

/** A named group of entities that inserts refer to. */
export type Block = {
  readonly name: string;
  readonly base: { readonly x: number; readonly y: number };
  readonly entities: readonly RawEntity[];
  /** Its geometry lies in another file. */
  readonly elsewhere: boolean;
};

export type LayerEntry = { readonly name: string; readonly hidden: boolean };

/** The sections of a DXF that matter for cutting. */
export type DxfDocument = {
  readonly tags: Tags;
  readonly insertUnits: number | null;
  /** 0 imperial, 1 metric, null when not said. */
  readonly measurement: number | null;
  readonly layers: readonly LayerEntry[];
  readonly blocks: ReadonlyMap<string, Block>;
  readonly entities: readonly RawEntity[];
  readonly endMissing: boolean;
};

/** Value of a tag as text, decoded and trimmed. */
export const tagText = (tags: Tags, i: number): string => nameDecode(String(tags.valueOf(i)));

/** Value of a tag as a number. Throws DrawingRefusal with the place when it is none, or larger than a drawing can hold. */
export function tagNumber(tags: Tags, i: number): number {
  const plain = tags.numberOf(i);
  if (Math.abs(plain) <= drawingLimits.number) return plain;
  const text = tags.valueOf(i);
  if (typeof text === 'number') return withinReason(tags, i, text);
  if (/^[+-]?(\d+\.?\d*|\.\d+)([eE][+-]?\d+)?$/.test(text)) return withinReason(tags, i, Number(text));
  const shown = text.slice(0, 30).replace(/[^\x20-\x7e]/g, '?');
  if (/^[+-]?\d*,\d+([eE][+-]?\d+)?$/.test(text)) {
    const place = tags.placeOf(i);
    throw new DrawingRefusal(
      `${place.charAt(0).toUpperCase()}${place.slice(1)} reads "${shown}": a decimal comma. DXF numbers have a decimal point; export the drawing with a point.`,
    );
  }
  throw new DrawingRefusal(
    `A number is expected at ${tags.placeOf(i)} but "${shown}" stands there. The file is damaged; export it again.`,
  );
}

/** A damaged file holds numbers whose squares are infinite: refused here, before anything is computed with them. */
function withinReason(tags: Tags, i: number, value: number): number {
  if (Math.abs(value) <= drawingLimits.number) return value;
  throw new DrawingRefusal(
    `The number at ${tags.placeOf(i)} is ${value}, larger than any in a drawing. The file is damaged; export it again.`,
  );
}

/** Parts the tags into header values, layers, blocks and entities. Throws DrawingRefusal when there is no ENTITIES section. */
export function documentOf(tags: Tags): DxfDocument {
  const { codes } = tags;
  const is = (i: number, code: number, text: string) => codes[i] === code && String(tags.valueOf(i)) === text;
  let insertUnits: number | null = null;
  let measurement: number | null = null;
  const layers: LayerEntry[] = [];
  const blocks = new Map<string, Block>();
  let entities: RawEntity[] | null = null;
  let endMissing = true;

  for (let i = 0; i < codes.length; i++) {
    if (is(i, 0, 'EOF')) endMissing = false;
    if (!is(i, 0, 'SECTION')) continue;
    const section = codes[i + 1] === 2 ? String(tags.valueOf(i + 1)) : '';
    let end = i + 1;
    // a section that is never ended stops where the next begins
    while (end < codes.length && !(codes[end] === 0 && endsSection.has(String(tags.valueOf(end))))) end++;
    if (section === 'HEADER') {
      for (let k = i + 2; k + 1 < end; k++) {
        if (codes[k] !== 9) continue;
        if (is(k, 9, '$INSUNITS')) insertUnits = tagNumber(tags, k + 1);
        if (is(k, 9, '$MEASUREMENT')) measurement = tagNumber(tags, k + 1);
      }
    } else if (section === 'TABLES') {
      for (const entry of recordsOf(tags, i + 2, end)) if (entry.type === 'LAYER') layers.push(layerOf(tags, entry));
    } else if (section === 'BLOCKS') readBlocks(tags, recordsOf(tags, i + 2, end), blocks);
    else if (section === 'ENTITIES') entities = [...(entities ?? []), ...recordsOf(tags, i + 2, end)];
    i = is(end, 0, 'ENDSEC') ? end : end - 1;
  }
  if (!entities) {
    throw new DrawingRefusal(
      'The file has no ENTITIES section, which holds the geometry of a DXF. It is cut short or no drawing; export it again.',
    );
  }
  return { tags, insertUnits, measurement, layers, blocks, entities, endMissing };
}

const endsSection: ReadonlySet<string> = new Set(['ENDSEC', 'EOF', 'SECTION']);

/** Records from each group code 0 to the next. */
function recordsOf(tags: Tags, from: number, end: number): RawEntity[] {
  const records: RawEntity[] = [];
  let first = -1;
  for (let i = from; i <= end; i++) {
    if (i < end && tags.codes[i] !== 0) continue;
    if (first >= 0) records.push({ type: typeOf(String(tags.valueOf(first))), first: first + 1, end: i });
    first = i;
  }
  return records;
}

/** A type as it is shown: a damaged one may hold anything. */
function typeOf(text: string): string {
  const known = commonTypes.get(text);
  if (known !== undefined) return known;
  return /^[A-Z0-9_]{1,40}$/.test(text) ? text : typeShown(text);
}

/** Types that come by thousands, so that one text stands for all. */
const commonTypes = new Map(
  ['LINE', 'ARC', 'CIRCLE', 'LWPOLYLINE', 'POLYLINE', 'VERTEX', 'SEQEND', 'INSERT', 'SPLINE'].map((type) => [
    type,
    type,
  ]),
);

function typeShown(text: string): string {
  const plain = text
    .slice(0, 40)
    .toUpperCase()
    .replace(/[^A-Z0-9_$*-]/g, '?');
  return plain === '' ? 'entity without a type' : plain;
}

function layerOf(tags: Tags, entry: RawEntity): LayerEntry {
  let name = '';
  let hidden = false;
  for (let i = entry.first; i < entry.end; i++) {
    if (tags.codes[i] === 2) name = tagText(tags, i);
    // a negative colour is a layer that is off; bit 1 of the flags is frozen
    if (tags.codes[i] === 62 && tagNumber(tags, i) < 0) hidden = true;
    if (tags.codes[i] === 70 && (tagNumber(tags, i) & 1) === 1) hidden = true;
  }
  return { name, hidden };
}

function readBlocks(tags: Tags, records: readonly RawEntity[], blocks: Map<string, Block>): void {
  let open: { name: string; base: { x: number; y: number }; entities: RawEntity[]; elsewhere: boolean } | null = null;
  const shut = () => {
    if (open) blocks.set(open.name.toUpperCase(), open);
    open = null;
  };
  for (const record of records) {
    if (record.type === 'BLOCK') {
      // one that is never ended stops where the next begins
      shut();
      open = { name: '', base: { x: 0, y: 0 }, entities: [], elsewhere: false };
      for (let i = record.first; i < record.end; i++) {
        if (tags.codes[i] === 2) open.name = tagText(tags, i);
        if (tags.codes[i] === 10) open.base.x = tagNumber(tags, i);
        if (tags.codes[i] === 20) open.base.y = tagNumber(tags, i);
        // bits 4 and 8: a reference to another drawing, or laid over it
        if (tags.codes[i] === 70) open.elsewhere = (tagNumber(tags, i) & (4 | 8)) !== 0;
      }
    } else if (record.type === 'ENDBLK') shut();
    else open?.entities.push(record);
  }
  shut();
}
