import { STATUS_CODES } from 'node:http';
import type { ErrorRequestHandler, RequestHandler } from 'express';
import type { Logger } from 'pino';
import { DomainError } from '../errors.js';

/** SQLSTATE classes and socket errors that say the database cannot be reached, not that a query was wrong. */
const unreachable =
  /^(ECONNREFUSED|ECONNRESET|EPIPE|ETIMEDOUT|ENOTFOUND|EAI_AGAIN|EHOSTUNREACH|57P0[1-5]|08\w{3}|53300)$/;

function isDatabaseDown(error: unknown): boolean {
  if (!(error instanceof Error)) return false;
  const { code } = error as { code?: unknown };
  if (typeof code === 'string' && unreachable.test(code)) return true;
  return /Connection terminated|not queryable|timeout exceeded when trying to connect|the database system is (starting|shutting)/.test(
    error.message,
  );
}

/** What the JSON reader says, as an error of ours. */
function fromBodyParser(error: unknown): DomainError | null {
  const { type } = error as { type?: unknown };
  if (type === 'entity.too.large') return new DomainError(413, 'too-large', 'This is larger than 5 MB');
  if (type === 'entity.parse.failed') return new DomainError(400, 'unreadable', 'The body is not readable as JSON');
  if (type === 'encoding.unsupported' || type === 'charset.unsupported') {
    return new DomainError(415, 'not-json', 'Send the body as UTF-8 JSON');
  }
  if (typeof type === 'string' && /^(entity|request)\./.test(type)) {
    return new DomainError(400, 'unreadable', 'The body could not be read');
  }
  // Express and its parsers mark what the caller did wrong with a status.
  const { status } = error as { status?: unknown };
  const isCallers = error instanceof URIError || (typeof status === 'number' && status >= 400 && status < 500);
  return isCallers ? new DomainError(400, 'unreadable', 'The request is not readable') : null;
}

function asDomainError(error: unknown): DomainError | null {
  if (error instanceof DomainError) return error;
  if (isDatabaseDown(error)) {
    return new DomainError(
      503,
      'database-down',
      'The database cannot be reached just now: this may not have been saved, try again in a moment',
      [],
      {},
      { 'Retry-After': '2' },
    );
  }
  return fromBodyParser(error);
}

/** Every error as problem details (RFC 9457). What we did not foresee is logged, and told without its inside. */
export function problems(log: Logger): ErrorRequestHandler {
  return (error: unknown, request, response, next) => {
    if (response.headersSent) {
      next(error);
      return;
    }
    const known = asDomainError(error);
    if (!known || known.status >= 500) log.error({ err: error, url: request.url }, 'request failed');
    const problem =
      known ??
      new DomainError(500, 'unforeseen', 'Something went wrong on our side; nothing was changed. It was logged');
    response
      .status(problem.status)
      .set(problem.headers)
      .type('application/problem+json')
      .send(
        JSON.stringify({
          type: 'about:blank',
          title: STATUS_CODES[problem.status] ?? 'Error',
          status: problem.status,
          detail: problem.message,
          code: problem.code,
          errors: problem.errors,
          ...problem.extra,
        }),
      );
  };
}

/** What is not routed under /api is a problem too, not the client’s page. */
export const unknownRoute: RequestHandler = () => {
  throw new DomainError(404, 'not-found', 'There is no such address');
};
