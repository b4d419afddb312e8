import type { PlacementArray } from '../../strategy/path/plate/index.ts';
import { demoId } from './ids.ts';
import { demoPlates } from './materials.ts';
import { approvedDemoRevision, demoParts } from './parts.ts';

/** Between the boxes of neighbours, m: two kerfs and a little more than the clearance. */
const gap = 0.014;

const array = (of: { id: string }, columns: number, rows: number, x: number, y: number, alternate = false) => ({
  partId: of.id,
  array: { rows, columns, gap: { x: gap, y: gap }, at: { x, y }, turn: 0, mirrored: false, alternate },
});
type DemoLayout = {
  readonly id: string;
  readonly name: string;
  readonly plateId: string;
  readonly kerfWidth: number; // m
  readonly clearance: number; // m
  readonly edgeMargin: number; // m
  readonly plan: { readonly id: string; readonly revisionId: string; readonly thickness: number }; // m
  readonly arrays: readonly { readonly partId: string; readonly array: PlacementArray }[];
};

/** A footbridge's bearings and brackets from one plate. */
export function demoLayout(): DemoLayout {
  const plate = demoPlates.quay.find(({ tag }) => tag === 'Q-2003');
  if (!plate) throw new RangeError('the demo plate Q-2003 is not booked in');
  return {
    id: demoId('quay layout footbridge'),
    name: 'Footbridge bearings',
    plateId: plate.id,
    kerfWidth: 7e-4,
    clearance: 0.012,
    edgeMargin: 0.012,
    plan: {
      id: demoId('quay plan layout footbridge'),
      revisionId: approvedDemoRevision('Bearing plates 20, No. 2'),
      thickness: 0.02,
    },
    arrays: [
      array(demoParts.bearing, 2, 2, 0.015, 0.015),
      array(demoParts.bracket, 3, 1, 0.845, 0.015, true),
      array(demoParts.lug, 3, 1, 0.845, 0.275),
    ],
  };
}
