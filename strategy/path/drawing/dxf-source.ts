import { documentOf } from './document.ts';
import { drawnEntities, entityCounts } from './entities.ts';
import type { Source } from './source.ts';
import { Notes } from './source.ts';
import { tagsOf } from './tags.ts';
import type { DrawingUnit } from './unit.ts';
import { headerUnit, unitLength } from './unit.ts';

/** What a DXF draws, read in the unit given or else in the one it states. Throws DrawingRefusal with a sentence and a place. */
export function dxfSource(bytes: Uint8Array, given: DrawingUnit | undefined): Source {
  const tags = tagsOf(bytes);
  const document = documentOf(tags);
  const notes = new Notes();
  const stated = headerUnit(document.insertUnits, document.measurement);
  const unit = given ?? stated.unit;
  const paths = drawnEntities(document, unitLength[unit], notes);
  if (document.endMissing || tags.cutShort) notes.leave('end of the file (it stops before its EOF mark)', null);
  return {
    paths,
    notes,
    hiddenLayers: new Set(document.layers.filter(({ hidden }) => hidden).map(({ name }) => name)),
    unit,
    unitDoubt: stated.doubt,
    counts: entityCounts(document),
  };
}
