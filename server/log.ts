import { pino, type DestinationStream, type Logger } from 'pino';

/** Of an error only what helps to find it: a failed query’s parameters can hold hashes and what people typed. */
function serializeError(error: unknown): unknown {
  if (!(error instanceof Error)) return error;
  const { code, query } = error as { code?: unknown; query?: unknown };
  return { type: error.name, message: error.message, code, query, stack: error.stack };
}

/** The program’s log. Headers, bodies and parameters never go into it, so neither do cookies and passwords. */
export function makeLog(level: string, destination?: DestinationStream): Logger {
  const options = { level, serializers: { err: serializeError } };
  return destination === undefined ? pino(options) : pino(options, destination);
}
