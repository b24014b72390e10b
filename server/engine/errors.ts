/** What is wrong with an input, for one field. `path` is a JSON pointer (RFC 6901) into the document. */
export interface FieldError {
  path: string;
  message: string;
  node?: string;
  link?: string;
}

/**
 * An input that was understood but cannot be computed. Every message is one a user can act on. Not converging
 * is reported in this way too: an unconverged network is never an answer.
 */
export class EngineError extends Error {
  constructor(
    readonly code: EngineErrorCode,
    message: string,
    readonly errors: FieldError[] = [],
  ) {
    super(message);
    this.name = 'EngineError';
  }
}

export type EngineErrorCode =
  | 'invalid-document'
  | 'unknown-reference'
  | 'duplicate-id'
  | 'no-path-to-fixed'
  | 'heat-into-fixed'
  | 'not-converged'
  | 'runaway'
  | 'outside-range'
  | 'not-computed';
