import { cornerPlan } from '../../strategy/corners/index.ts';
import { drawingRead } from '../../strategy/path/drawing/index.ts';
import { answerQuestions } from '../workers/answer.ts';
import type { DrawingAnswer, DrawingQuestion } from './reader.ts';
import { wireReading } from './wire.ts';

answerQuestions<DrawingQuestion, DrawingAnswer>((question) => {
  if (question.kind === 'plan') return { kind: 'plan', plan: cornerPlan(question.request) };
  const reading = drawingRead(question.bytes, question.answers);
  return reading.kind === 'none' ? reading : { kind: 'reading', reading: wireReading(reading) };
});
