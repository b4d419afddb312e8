import { URL } from 'node:url';
import type { PlanComparison } from '../../shared/estimates.ts';
import type { DrawingAnswers, DrawingReadingWire } from '../../shared/parts.ts';
import type { PlanAsked, PlannedPlate } from '../corner-plans/compute.ts';
import type { LayoutAsked, LayoutJudgement } from '../../strategy/path/plate/index.ts';
import type { ProblemCode } from '../../shared/errors.ts';
import type { EstimateAsked } from '../corner-plans/estimate.ts';
import { AppError } from '../errors.ts';
import { createPool, WorkerRefusal } from '../workers/pool.ts';

export type DrawingQuestion =
  | { readonly kind: 'read'; readonly bytes: Uint8Array; readonly answers: DrawingAnswers }
  | { readonly kind: 'layout'; readonly asked: LayoutAsked }
  | { readonly kind: 'plan'; readonly asked: PlanAsked }
  | { readonly kind: 'estimate'; readonly asked: EstimateAsked };
export type DrawingAnswer =
  | { readonly kind: 'reading'; readonly reading: DrawingReadingWire }
  | { readonly kind: 'none'; readonly why: string }
  | { readonly kind: 'layout'; readonly judgement: LayoutJudgement }
  | { readonly kind: 'plan'; readonly plan: PlannedPlate }
  | { readonly kind: 'estimate'; readonly comparison: PlanComparison };

/** Reads drawings, judges layouts, plans corners and estimates plans away from the thread that answers requests, within a time and a memory. */
export type DrawingReader = {
  /** 422 with a sentence when the file is no drawing that can be read. */
  read(bytes: Uint8Array, answers: DrawingAnswers): Promise<DrawingReadingWire>;
  layout(asked: LayoutAsked): Promise<LayoutJudgement>;
  /** 409 with a sentence when the corners can't be planned: the plan that is kept stays as it was. */
  plan(asked: PlanAsked): Promise<PlannedPlate>;
  /** What a plan costs, beside other ways to cut the same. */
  estimate(asked: EstimateAsked): Promise<PlanComparison>;
  close(): Promise<void>;
};

/** Time for one drawing, s. The largest real ones take a tenth of it. */
const readSeconds = 2;
/** Time for one layout, s. */
const layoutSeconds = 5;
/** Time for one plan, s. */
const planSeconds = 20;
/** Time for one plan's estimate beside other ways to cut it, s: four plans with their paths and the heat of their plates. */
const estimateSeconds = 40;

export function createDrawingReader(): DrawingReader {
  const module = new URL('./drawing.worker.ts', import.meta.url);
  const common = { module, threads: 1, waiting: 20, memory: 384 };
  // A thread for each and not one queue: a long plan must not keep a drawing waiting.
  const reads = createPool<DrawingQuestion, DrawingAnswer>({ ...common, deadline: readSeconds * 1000 });
  const layouts = createPool<DrawingQuestion, DrawingAnswer>({ ...common, deadline: layoutSeconds * 1000 });
  const plans = createPool<DrawingQuestion, DrawingAnswer>({ ...common, deadline: planSeconds * 1000 });
  const estimates = createPool<DrawingQuestion, DrawingAnswer>({ ...common, deadline: estimateSeconds * 1000 });
  return {
    read: async (bytes, answers) => {
      const answer = await reads.ask({ kind: 'read', bytes, answers }).catch((error: unknown) => {
        throw asRefusal(
          error,
          'bad-drawing',
          `The drawing could not be read within ${readSeconds} s. Draw the part alone and export it again.`,
        );
      });
      if (answer.kind === 'none') throw new AppError('bad-drawing', answer.why);
      if (answer.kind !== 'reading') throw new Error('the drawing worker answered another question');
      return answer.reading;
    },
    layout: async (asked) => {
      const answer = await layouts.ask({ kind: 'layout', asked }).catch((error: unknown) => {
        throw asRefusal(
          error,
          'unavailable',
          `The layout could not be checked within ${layoutSeconds} s: too much lies on this plate for one layout.`,
        );
      });
      if (answer.kind !== 'layout') throw new Error('the drawing worker answered another question');
      return answer.judgement;
    },
    plan: async (asked) => {
      const answer = await plans.ask({ kind: 'plan', asked }).catch((error: unknown) => {
        throw asRefusal(
          error,
          'unavailable',
          `The corners could not be planned within ${planSeconds} s: the part has too many of them for one plan.`,
        );
      });
      if (answer.kind === 'none') {
        throw new AppError('wrong-state', `These corners can’t be planned: ${answer.why}.`);
      }
      if (answer.kind !== 'plan') throw new Error('the drawing worker answered another question');
      return answer.plan;
    },
    estimate: async (asked) => {
      const answer = await estimates.ask({ kind: 'estimate', asked }).catch((error: unknown) => {
        throw asRefusal(
          error,
          'unavailable',
          `The plan could not be estimated within ${estimateSeconds} s: it has too much in it.`,
        );
      });
      if (answer.kind !== 'estimate') throw new Error('the drawing worker answered another question');
      return answer.comparison;
    },
    close: async () => {
      await Promise.all([reads.close(), layouts.close(), plans.close(), estimates.close()]);
    },
  };
}

function asRefusal(error: unknown, code: ProblemCode, tooLong: string): unknown {
  if (!(error instanceof WorkerRefusal)) return error;
  if (error.why === 'busy') return new AppError('unavailable', 'Too many drawings at once.', { retryAfter: 5 });
  return new AppError(code, tooLong);
}
