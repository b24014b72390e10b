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
    const missing = issue.code === 'invalid_type' && issue.input === undefined;
    return [{ path, message: missing && /^Invalid input/.test(issue.message) ? 'This is missing' : issue.message }];
  });
}

/** Everything that zod found, as errors beside fields. */
export function fieldErrors(error: z.ZodError, prefix = ''): FieldError[] {
  return flatten(error.issues, []).map(({ path, message }) => ({
    path: `${prefix}${path.map((step) => `/${escaped(step)}`).join('')}`,
    message,
  }));
}
