import type { Problem } from '../../shared/schemas/problem.js';

/** What the server refused, with a message for the person and one for each field. */
export class ApiError extends Error {
  constructor(
    readonly status: number,
    readonly problem: Problem & Record<string, unknown>,
  ) {
    super(problem.detail);
    this.name = 'ApiError';
  }

  get code(): string {
    return this.problem.code;
  }

  /** Message beside the field of this JSON pointer, if there is one. */
  at(path: string): string | undefined {
    return this.problem.errors.find((error) => error.path === path)?.message;
  }
}

/** The server did not answer at all. */
export class ConnectionError extends Error {
  constructor() {
    super('There is no connection to the server just now');
    this.name = 'ConnectionError';
  }
}

type SignedOutListener = () => void;
const signedOutListeners = new Set<SignedOutListener>();

/** Calls back whenever the server says that the session has ended. */
export function onSignedOut(listener: SignedOutListener): () => void {
  signedOutListeners.add(listener);
  return () => signedOutListeners.delete(listener);
}

function plainProblem(status: number): Problem {
  const detail = status >= 500 ? 'The server cannot answer just now' : `The server answered ${String(status)}`;
  return { type: 'about:blank', title: 'Error', status, detail, code: 'unforeseen', errors: [] };
}

/**
 * One call of the API.
 *
 * @param path under /api/v1
 * @throws ApiError for what the server refuses, ConnectionError where it cannot be reached; an abort passes as it is
 */
export async function request<T>(
  method: string,
  path: string,
  options: { body?: unknown; signal?: AbortSignal | undefined } = {},
): Promise<T> {
  let response: Response;
  try {
    response = await fetch(`/api/v1${path}`, {
      method,
      credentials: 'same-origin',
      ...(options.signal ? { signal: options.signal } : {}),
      ...(options.body === undefined
        ? {}
        : { headers: { 'Content-Type': 'application/json' }, body: JSON.stringify(options.body) }),
    });
  } catch (error) {
    if (error instanceof DOMException && error.name === 'AbortError') throw error;
    throw new ConnectionError();
  }
  if (response.ok) return (response.status === 204 ? undefined : await response.json()) as T;
  let problem: Problem;
  try {
    problem = (await response.json()) as Problem;
    if (typeof problem.detail !== 'string') problem = plainProblem(response.status);
  } catch {
    // A proxy’s page instead of ours.
    problem = plainProblem(response.status);
  }
  if (response.status === 401 && problem.code === 'not-signed-in')
    for (const listener of signedOutListeners) listener();
  throw new ApiError(response.status, problem);
}

/** A query string of what is defined. */
export function queryOf(values: Record<string, string | number | boolean | undefined>): string {
  const entries = Object.entries(values).filter(([, value]) => value !== undefined && value !== '');
  const text = new URLSearchParams(entries.map(([key, value]) => [key, String(value)])).toString();
  return text === '' ? '' : `?${text}`;
}

/** A message for a person, whatever was thrown. */
export function messageOf(error: unknown): string {
  return error instanceof Error ? error.message : 'Something went wrong';
}
