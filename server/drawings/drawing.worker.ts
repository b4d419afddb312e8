import { drawingRead } from '../../strategy/path/drawing/index.ts';
import { layoutJudged } from '../../strategy/path/plate/index.ts';
import { platePlanner } from '../corner-plans/compute.ts';
import { planComparison } from '../corner-plans/estimate.ts';
import { answerQuestions } from '../workers/answer.ts';
import type { DrawingAnswer, DrawingQuestion } from './reader.ts';
import { wireReading } from './wire.ts';

const planned = platePlanner();

answerQuestions<DrawingQuestion, DrawingAnswer>((question) => {
  if (question.kind === 'plan') {
    try {
      return { kind: 'plan', plan: planned(question.asked) };
    } catch (error) {
      // what can't be planned the planner says in a sentence; anything else is a fault
      if (error instanceof RangeError) return { kind: 'none', why: error.message };
      throw error;
    }
  }
  if (question.kind === 'estimate') return { kind: 'estimate', comparison: planComparison(question.asked) };
  if (question.kind === 'layout') return { kind: 'layout', judgement: layoutJudged(question.asked) };
  const reading = drawingRead(question.bytes, question.answers);
  return reading.kind === 'none' ? reading : { kind: 'reading', reading: wireReading(reading) };
});
