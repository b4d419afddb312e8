import type { ErrorRequestHandler, Response } from 'express';
import { randomUUID } from 'node:crypto';
import type { Logger } from 'pino';
import { problemCodes, type Problem, type ProblemCode } from '../shared/errors.ts';

/** A refusal that the caller may read. Whatever else is thrown is logged whole and answered with nothing of it. */
export class AppError extends Error {
  readonly code: ProblemCode;
  readonly more: Pick<Problem, 'errors' | 'retryAfter'>;

  constructor(code: ProblemCode, detail: string, more: Pick<Problem, 'errors' | 'retryAfter'> = {}) {
    super(detail);
    this.name = 'AppError';
    this.code = code;
    this.more = more;
  }
}

export const notFound = (what = 'There is nothing here'): AppError => new AppError('not-found', `${what}.`);

export function sendProblem(response: Response, error: AppError, instance?: string): void {
  const { status, title } = problemCodes[error.code];
  const problem: Problem = {
    type: `urn:cinderpath:problem:${error.code}`,
    title,
    status,
    code: error.code,
    detail: error.message,
    ...(instance ? { instance } : {}),
    ...error.more,
  };
  if (error.more.retryAfter !== undefined) response.set('Retry-After', String(error.more.retryAfter));
  response.removeHeader('ETag');
  response.status(status).type('application/problem+json').send(JSON.stringify(problem));
}

/** The one place where an error becomes an answer. */
export function errorHandler(log: Logger): ErrorRequestHandler {
  return (error: unknown, _request, response, next) => {
    // Half an answer is out already: only breaking the connection tells the caller that it is not whole.
    if (response.headersSent) {
      next(error);
      return;
    }
    const known = asAppError(error);
    if (known) {
      sendProblem(response, known);
      return;
    }
    const id = randomUUID();
    log.error({ err: error, problem: id }, 'unexpected error');
    sendProblem(
      response,
      new AppError('server-error', 'The server failed at this. It is logged and can be found by its id.'),
      `urn:uuid:${id}`,
    );
  };
}

/** The refusal an error means, or null when it is nobody's refusal but a fault. */
export function asAppError(error: unknown): AppError | null {
  if (error instanceof AppError) return error;
  return fromHttp(error) ?? fromDatabase(error);
}

/** Express and its body parsers throw errors that carry an HTTP status of their own. */
function fromHttp(error: unknown): AppError | null {
  if (!(error instanceof Error) || !('status' in error) || typeof error.status !== 'number') return null;
  if (error.status === 413) return new AppError('too-large', 'The request is larger than the server takes.');
  if (error.status < 400 || error.status >= 500) return null;
  return new AppError('bad-request', 'The request could not be read as what it says it is.');
}

type DatabaseFault = { readonly code: string; readonly constraint: string | undefined };

/** PostgreSQL's last word where two requests got past the checks side by side, or where input can't be stored at all. */
function fromDatabase(error: unknown): AppError | null {
  const fault = databaseFault(error);
  if (!fault) return null;
  const { code, constraint = '' } = fault;
  switch (code) {
    case '23505': {
      const detail = alreadyThere(constraint);
      const field = ['tag', 'name'].find((name) => constraint.includes(name));
      return new AppError('already-there', detail, field ? { errors: [{ pointer: `/${field}`, detail }] } : {});
    }
    case '23P01':
      return new AppError('overlap', 'Another strategy was approved for part of this range meanwhile.');
    case '23503':
      return new AppError('invalid-fields', 'Something this refers to is not there.');
    case 'CP001':
    case 'CP002':
      return new AppError('wrong-state', 'Its state does not allow this any more.');
    case 'CP003':
      return new AppError('own-work', 'You wrote part of this revision. A second person must decide.');
    case '53300': // too many connections
    case '57014': // statement timeout
    case '57P01':
    case '57P02':
    case '57P03':
      return unavailable();
  }
  if (code.startsWith('08')) return unavailable();
  // Data exceptions: characters PostgreSQL can't hold (U+0000), numbers out of its range.
  if (code.startsWith('22')) return new AppError('bad-request', 'Some text or number in this can’t be stored.');
  return null;
}

const unavailable = () =>
  new AppError('unavailable', 'The database does not answer. Try again in a moment.', { retryAfter: 5 });

function alreadyThere(constraint: string): string {
  if (constraint.includes('tag'))
    return 'A plate with this tag is booked in already. Look at the tag again, or correct that plate.';
  if (constraint.includes('name')) return 'Something with this name is there already. Give it another name.';
  if (constraint.includes('person')) return 'This person belongs to the plant already.';
  if (constraint.includes('house_rules_expression')) return 'A rule that says just this is in force already.';
  if (constraint.includes('draft')) return 'This strategy has a draft already.';
  return 'Something with this id is there already.';
}

const connectionFaults = ['ECONNREFUSED', 'ECONNRESET', 'ETIMEDOUT', 'EPIPE', 'ENOTFOUND', 'EAI_AGAIN'];

/** The PostgreSQL code within an error, through the wrapping of the query builder; connection faults come as 08006. */
export function databaseFault(error: unknown): DatabaseFault | null {
  for (let at: unknown = error, depth = 0; at instanceof Error && depth < 5; at = at.cause, depth += 1) {
    if ('code' in at && typeof at.code === 'string') {
      if (/^[0-9A-Z]{5}$/.test(at.code) && 'severity' in at) {
        return {
          code: at.code,
          constraint: 'constraint' in at && typeof at.constraint === 'string' ? at.constraint : undefined,
        };
      }
      if (connectionFaults.includes(at.code) && !('$metadata' in at)) return { code: '08006', constraint: undefined };
    }
    if (
      /^(Connection terminated|timeout exceeded when trying to connect|Client has encountered a connection error)/.test(
        at.message,
      )
    ) {
      return { code: '08006', constraint: undefined };
    }
  }
  return null;
}
