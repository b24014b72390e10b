/** Reading and changing a document by JSON pointer (RFC 6901), without changing the document itself. */

export function pointerSegments(pointer: string): string[] {
  if (pointer === '') return [];
  return pointer
    .slice(1)
    .split('/')
    .map((segment) => segment.replaceAll('~1', '/').replaceAll('~0', '~'));
}

export function pointerOf(segments: readonly PropertyKey[]): string {
  return segments.map((segment) => `/${String(segment).replaceAll('~', '~0').replaceAll('/', '~1')}`).join('');
}

function child(parent: unknown, key: string): unknown {
  if (Array.isArray(parent)) return (parent as unknown[])[Number(key)];
  if (typeof parent !== 'object' || parent === null || !Object.hasOwn(parent, key)) return undefined;
  return (parent as Record<string, unknown>)[key];
}

/** The value at a pointer; `undefined` where there is none. */
export function valueAt(document: unknown, pointer: string): unknown {
  return pointerSegments(pointer).reduce(child, document);
}

function withSegments(parent: unknown, segments: readonly string[], value: unknown): unknown {
  const [key, ...rest] = segments;
  if (key === undefined) return value;
  const changed = withSegments(child(parent, key), rest, value);
  if (Array.isArray(parent)) {
    const copy = [...(parent as unknown[])];
    copy[Number(key)] = changed;
    return copy;
  }
  return { ...(typeof parent === 'object' ? parent : {}), [key]: changed };
}

/** A copy of the document with another value at the pointer; what is not on the way is shared with the original. */
export function withValueAt<T>(document: T, pointer: string, value: unknown): T {
  return withSegments(document, pointerSegments(pointer), value) as T;
}

export interface Difference {
  pointer: string;
  mine: unknown;
  theirs: unknown;
}

function isContainer(value: unknown): value is Record<string, unknown> | unknown[] {
  return typeof value === 'object' && value !== null;
}

/** Every field in which two documents differ, deepest first level of difference. */
export function differences(mine: unknown, theirs: unknown, pointer = ''): Difference[] {
  if (Object.is(mine, theirs)) return [];
  if (!isContainer(mine) || !isContainer(theirs) || Array.isArray(mine) !== Array.isArray(theirs)) {
    return [{ pointer, mine, theirs }];
  }
  const keys = new Set([...Object.keys(mine), ...Object.keys(theirs)]);
  return [...keys].flatMap((key) => differences(child(mine, key), child(theirs, key), `${pointer}${pointerOf([key])}`));
}
