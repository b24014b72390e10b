import type { FieldError } from './engine/errors.js';

/** An error that a person can act on, with the status that a route answers. */
export class DomainError extends Error {
  constructor(
    readonly status: number,
    readonly code: string,
    message: string,
    readonly errors: FieldError[] = [],
    /** Further members of the problem document, such as both versions of a conflict. */
    readonly extra: Record<string, unknown> = {},
    readonly headers: Record<string, string> = {},
  ) {
    super(message);
    this.name = 'DomainError';
  }
}

export function notFound(what: string): DomainError {
  return new DomainError(404, 'not-found', `There is no such ${what}`);
}

export function forbidden(message: string, code = 'forbidden'): DomainError {
  return new DomainError(403, code, message);
}

export function conflict(code: string, message: string, extra: Record<string, unknown> = {}): DomainError {
  return new DomainError(409, code, message, [], extra);
}

/** Understood, but not valid: one entry per field. */
export function invalid(errors: FieldError[], message = errors[0]?.message ?? 'Not valid'): DomainError {
  return new DomainError(422, 'invalid', message, errors);
}
