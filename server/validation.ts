import type { z } from 'zod';
import type { FieldError } from './engine/errors.js';

/** One step of a JSON pointer (RFC 6901). */
function escaped(step: PropertyKey): string {
  return String(step).replaceAll('~', '~0').replaceAll('/', '~1');
}

type Issue = z.core.$ZodIssue;

/** The issues of the union’s branch that came nearest: the one with the deepest, then the fewest, complaints. */
function nearestBranch(issue: Issue): Issue[] | null {
  if (issue.code !== 'invalid_union') return null;
  const branches = issue.errors.filter((branch) => branch.length > 0);
  if (branches.length === 0) return null;
  const depth = (branch: Issue[]) => Math.max(...branch.map(({ path }) => path.length));
  const best = [...branches].sort((a, b) => depth(b) - depth(a) || a.length - b.length)[0];
  return best && depth(best) > 0 && !best.every(({ code }) => code === 'unrecognized_keys') ? best : null;
}

const kinds: Record<string, string> = {
  string: 'text',
  number: 'a number',
  int: 'a whole number',
  boolean: 'true or false',
  array: 'a list',
  object: 'an object',
  record: 'an object',
};

/** The schema’s own message, or where it has none what zod means, as people say it. */
function inWords(issue: Issue): string {
  if (!/^Invalid (input|option)/.test(issue.message)) return issue.message;
  if (issue.code === 'invalid_value') return `This must be one of: ${issue.values.map(String).join(', ')}`;
  if (issue.code !== 'invalid_type') return issue.message;
  return issue.input === undefined ? 'This is missing' : `This must be ${kinds[issue.expected] ?? issue.expected}`;
}

function flatten(
  issues: readonly Issue[],
  base: readonly PropertyKey[],
): { path: readonly PropertyKey[]; message: string }[] {
  return issues.flatMap((issue) => {
    const path = [...base, ...issue.path];
    const branch = nearestBranch(issue);
    if (branch) return flatten(branch, path);
    if (issue.code === 'unrecognized_keys') {
      return issue.keys.map((key) => ({ path: [...path, key], message: `There is no field “${key}” here` }));
    }
    return [{ path, message: inWords(issue) }];
  });
}

/** Everything that zod found, as errors beside fields. */
export function fieldErrors(error: z.ZodError, prefix = ''): FieldError[] {
  return flatten(error.issues, []).map(({ path, message }) => ({
    path: `${prefix}${path.map((step) => `/${escaped(step)}`).join('')}`,
    message,
  }));
}

/** Deeper than any document of ours goes. */
const mostNested = 64;
/** NUL and half a surrogate pair: JSON carries them, a database does not keep them. */
const loneSurrogate = /\p{Surrogate}/u;

function isUnkeepable(text: string): boolean {
  return text.includes('\0') || loneSurrogate.test(text);
}

/** Text that cannot be kept and nesting without sense, as errors beside fields; everything else passes. */
export function unkeepableParts(value: unknown, path = '', depth = 0): FieldError[] {
  if (typeof value === 'string') {
    return isUnkeepable(value) ? [{ path, message: 'This text holds a character that cannot be kept' }] : [];
  }
  if (typeof value !== 'object' || value === null) return [];
  if (depth > mostNested) return [{ path, message: `This is nested more than ${String(mostNested)} levels deep` }];
  const badKeys = Array.isArray(value) ? [] : Object.keys(value).filter(isUnkeepable);
  if (badKeys.length > 0) return [{ path, message: 'A field’s name here holds a character that cannot be kept' }];
  return Object.entries(value).flatMap(([key, entry]) => unkeepableParts(entry, `${path}/${escaped(key)}`, depth + 1));
}
