import { common } from '@/components/text/common.ts';
import type { Problem, ProblemCode } from '@/shared/errors.ts';

/** What the client itself has to say beside the API's own ways to say no. */
export type ClientCode = 'lost-connection' | 'unreadable-answer';

/** The one error that `apiCall` throws. */
export class ApiProblem extends Error {
  override readonly name = 'ApiProblem';
  readonly code: ProblemCode | ClientCode;
  readonly title: string;
  readonly detail: string;
  /** HTTP status; 0 when there was no answer. */
  readonly status: number;
  readonly fields: readonly { readonly pointer: string; readonly detail: string }[];
  /** Seconds to wait, where the server says so. */
  readonly retryAfter: number | null;

  constructor(given: {
    code: ProblemCode | ClientCode;
    title: string;
    detail: string;
    status: number;
    errors?: Problem['errors'];
    retryAfter?: number;
    cause?: unknown;
  }) {
    super(`${given.title}: ${given.detail}`, { cause: given.cause });
    this.code = given.code;
    this.title = given.title;
    this.detail = given.detail;
    this.status = given.status;
    this.fields = given.errors ?? [];
    this.retryAfter = given.retryAfter ?? null;
  }
}

export const lostConnection = (cause: unknown): ApiProblem =>
  new ApiProblem({ code: 'lost-connection', status: 0, ...common.lostConnection, cause });

export const unreadableAnswer = (status: number, cause: unknown): ApiProblem =>
  new ApiProblem({ code: 'unreadable-answer', status, ...common.unreadable, cause });

export const isProblem = (error: unknown, ...codes: readonly ApiProblem['code'][]): error is ApiProblem =>
  error instanceof ApiProblem && (codes.length === 0 || codes.includes(error.code));

/** Title and detail of any error, for people. */
export function problemSentence(error: unknown): { readonly title: string; readonly detail: string } {
  if (!(error instanceof ApiProblem)) return common.unknown;
  if (error.retryAfter === null) return error;
  const minutes = Math.ceil(error.retryAfter / 60);
  const wait = error.retryAfter < 60 ? 'Wait a minute.' : `Wait ${minutes} minutes.`;
  return { title: error.title, detail: `${error.detail} ${wait}` };
}
