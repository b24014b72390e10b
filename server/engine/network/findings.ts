import type { EngineErrorCode, FieldError } from '../errors.js';

/** What is wrong with a document, in the order found. */
export class Findings {
  readonly list: { code: EngineErrorCode; error: FieldError }[] = [];

  add(code: EngineErrorCode, error: FieldError): void {
    this.list.push({ code, error });
  }
}
