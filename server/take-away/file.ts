import type { TakeAwayFormat } from '../../shared/take-away.ts';
import { cutPathOf } from '../../strategy/path/compensation/index.ts';
import {
  blocksText,
  dxfText,
  svgText,
  type BlockFrame,
  type CutFileUnit,
} from '../../strategy/path/drawing/write/index.ts';
import { cutPathRequestOf } from './cut-path.ts';
import type { TakenPlan } from './repository.ts';
import { sheetPdf } from './sheet.ts';
import { otherUnitNote, planNotes, planSheet, planTitle, sentence } from './words.ts';

export type FileAsked = {
  readonly taken: TakenPlan;
  readonly as: TakeAwayFormat;
  readonly unit: CutFileUnit;
  readonly at: Date;
};
export type FileAnswer =
  { readonly kind: 'file'; readonly bytes: Uint8Array } | { readonly kind: 'none'; readonly why: string };

/** A plan's file; none when a contour can't be cut, since a path with one missing would look whole. */
export async function cutFile({ taken, as, unit, at }: FileAsked): Promise<FileAnswer> {
  const { path, problems } = cutPathOf(cutPathRequestOf(taken));
  const missing = problems.filter(({ leftOut }) => leftOut);
  if (missing.length > 0) return { kind: 'none', why: listed(missing.map(({ why }) => sentence(why))) };

  const cautions = problems.map(({ why }) => sentence(why));
  if (as === 'pdf') return { kind: 'file', bytes: await sheetPdf(planSheet(taken, path, unit, cautions, at)) };

  const { frame } = taken;
  const own: BlockFrame = frame.unit === unit ? frame : { header: '', footer: '' };
  const without = as === 'iso' && own !== frame && (frame.header !== '' || frame.footer !== '');
  const notes = [...(without ? [otherUnitNote(frame.unit)] : []), ...planNotes(taken, as, unit, cautions, at)];
  const file = { path, unit, title: planTitle(taken), notes };
  const text = { dxf: () => dxfText(file), svg: () => svgText(file), iso: () => blocksText(file, own) }[as]();
  return { kind: 'file', bytes: new TextEncoder().encode(text) };
}

/** The first few reasons: of a drawing that is wrong throughout, the rest says nothing new. */
function listed(sentences: readonly string[]): string {
  const shown = sentences.slice(0, 3).join(' ');
  const rest = sentences.length - 3;
  return rest > 0 ? `${shown} And ${rest} more.` : shown;
}
