/** Units a drawing may be in. */
export type DrawingUnit = 'mm' | 'cm' | 'dm' | 'm' | 'km' | 'µm' | 'inch' | 'foot' | 'yard' | 'mil' | 'px';

/** Metres a unit. The inch is 0.0254 m exactly. */
export const unitLength: Readonly<Record<DrawingUnit, number>> = {
  µm: 1e-6,
  mm: 1e-3,
  cm: 1e-2,
  dm: 1e-1,
  m: 1,
  km: 1e3,
  mil: 2.54e-5,
  inch: 0.0254,
  foot: 0.3048,
  yard: 0.9144,
  /** A pixel of an SVG: 96 to the inch (CSS Values and Units, section 6.2). */
  px: 0.0254 / 96,
};

/** $INSUNITS of the DXF reference. What is missing here is no unit a plate is drawn in. */
const insertUnits: ReadonlyMap<number, DrawingUnit> = new Map([
  [1, 'inch'],
  [2, 'foot'],
  [4, 'mm'],
  [5, 'cm'],
  [6, 'm'],
  [7, 'km'],
  [9, 'mil'],
  [10, 'yard'],
  [13, 'µm'],
  [14, 'dm'],
]);

const imperial: ReadonlySet<DrawingUnit> = new Set(['inch', 'foot', 'yard', 'mil']);

/** Smallest and largest part that is believed without asking, m. */
export const plausibleSize = { least: 5e-3, most: 30 } as const;

/** Unit the header states, or a sentence why it has to be asked, with the unit taken meanwhile. */
export function headerUnit(
  insunits: number | null,
  measurement: number | null,
): { unit: DrawingUnit; doubt: string | null } {
  if (insunits === null) return { unit: 'mm', doubt: 'the file does not state its unit' };
  if (insunits === 0) return { unit: 'mm', doubt: 'the file states that it has no unit' };
  const unit = insertUnits.get(insunits);
  if (!unit)
    return { unit: 'mm', doubt: `the file states unit number ${insunits}, which is not one plates are drawn in` };
  if (measurement === 1 && imperial.has(unit))
    return { unit, doubt: `the file states ${unit} but calls itself metric` };
  return { unit, doubt: null };
}
