import { z } from 'zod';
import type { CutPiece } from '../strategy/path/cut-path.ts';
import type { BlockFrame, CutFileUnit } from '../strategy/path/drawing/write/index.ts';
import { idSchema, pointSchema, versionSchema } from './basics.ts';
import { endpoint } from './endpoint.ts';
import { limits } from './limits.ts';
import { segmentSchema } from './parts.ts';

/** What a cut path is taken away as: a drawing, a picture, blocks after ISO 6983, a sheet to read. */
export const takeAwayFormats = ['dxf', 'svg', 'iso', 'pdf'] as const;
export type TakeAwayFormat = (typeof takeAwayFormats)[number];

export const takeAwayUnits = ['mm', 'inch'] as const satisfies readonly CutFileUnit[];

/** Stand in every file that is taken away, and beside the buttons for it. */
export const takeAwayCautions = [
  'Check this file and adapt it with the plant’s own postprocessing before anything is cut from it.',
  'Every number is an estimate until a test cut confirms it.',
  'Nothing in it starts beam, gas or pierce, or sets height or feed.',
  'The machine maker’s limits, local codes and the judgement of the licensed or responsible person come first.',
] as const;

/** Letter of a text that a plain line may not hold, with the line it stands in; null when there is none. */
function strangeLetter(text: string): { readonly letter: string; readonly line: number } | null {
  const found = /[^\x20-\x7e\n]/u.exec(text);
  return found && { letter: found[0], line: text.slice(0, found.index).split('\n').length };
}

/** Lines of printable ASCII, whatever line end they came with. */
const plainLinesSchema = z
  .string()
  .overwrite((text) => text.replace(/\r\n?/g, '\n'))
  .max(limits.blockLines, `At most ${limits.blockLines} characters.`)
  .superRefine((text, context) => {
    const strange = strangeLetter(text);
    if (!strange) return;
    const shown = strange.letter === '\t' ? 'a tab' : `“${strange.letter}”`;
    context.addIssue({
      code: 'custom',
      message: `Line ${strange.line} holds ${shown}. Plain letters, figures and signs alone (printable ASCII).`,
    });
  });

/** What a machine's blocks begin and end with, in the plant's own words to its control: kept as they are, never read. */
export const blockFrameFormSchema = z.strictObject({
  /** The unit these lines set: blocks in the other one are written without them. */
  unit: z.enum(takeAwayUnits),
  header: plainLinesSchema,
  footer: plainLinesSchema,
}) satisfies z.ZodType<BlockFrame>;
export type BlockFrameForm = z.infer<typeof blockFrameFormSchema>;

export const blockFrameSchema = z.object({
  /** The machine's. */
  version: versionSchema,
  unit: z.enum(takeAwayUnits),
  header: z.string(),
  footer: z.string(),
});
export type MachineBlockFrame = z.infer<typeof blockFrameSchema>;

const machineParams = z.object({ machineId: idSchema });

const cutPieceSchema = z.discriminatedUnion('kind', [
  z.object({
    kind: z.enum(['lead-in', 'contour', 'loop']),
    segments: z.array(segmentSchema),
    /** Shares of the cut's feed and mean power where it is eased. */
    feedShare: z.number().optional(),
    powerShare: z.number().optional(),
  }),
  z.object({ kind: z.literal('dwell'), at: pointSchema, duration: z.number() }), // s
]) satisfies z.ZodType<CutPiece>;

/** The path that a plan's files hold, to be looked at: in the order of cutting, with what could not be cut as planned. */
export const shownPathSchema = z.object({
  runs: z.array(
    z.object({ contourId: z.string(), name: z.string(), pierce: pointSchema, pieces: z.array(cutPieceSchema) }),
  ),
  problems: z.array(
    z.object({
      contourId: z.string(),
      at: pointSchema,
      why: z.string(),
      /** Whether the contour is left out of the path for it. */
      leftOut: z.boolean(),
    }),
  ),
});
export type ShownPath = z.infer<typeof shownPathSchema>;

export const cutPathEndpoints = {
  show: endpoint({
    method: 'GET',
    path: '/api/corner-plans/:planId/path',
    summary: 'A corner plan’s cut path, to be run on the screen',
    access: 'card.read',
    params: z.object({ planId: idSchema }),
    answer: shownPathSchema,
  }),
  take: endpoint({
    method: 'GET',
    path: '/api/corner-plans/:planId/cut-path',
    summary: 'A corner plan’s cut path as a file: DXF, SVG, blocks after ISO 6983, or a PDF sheet',
    access: 'cutPath.take',
    params: z.object({ planId: idSchema }),
    query: z.object({
      as: z.enum(takeAwayFormats, 'Choose dxf, svg, iso or pdf.'),
      unit: z.enum(takeAwayUnits, 'Choose mm or inch.').default('mm'),
    }),
    answer: null,
    bytes: true,
  }),
};

export const blockFrameEndpoints = {
  get: endpoint({
    method: 'GET',
    path: '/api/machines/:machineId/block-frame',
    summary: 'What a machine’s blocks begin and end with',
    access: 'cutPath.take',
    params: machineParams,
    answer: blockFrameSchema,
  }),
  change: endpoint({
    method: 'PUT',
    path: '/api/machines/:machineId/block-frame',
    summary: 'Write what a machine’s blocks begin and end with',
    access: 'machine.write',
    params: machineParams,
    body: blockFrameFormSchema,
    answer: blockFrameSchema,
    ifMatch: true,
  }),
};
