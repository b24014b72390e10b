import { EngineError } from '../errors.js';

/** The content of a value given in place; a version id must have been replaced by its content before. */
export function contentOf<T>(ref: { inline: T } | { version: string }, path: string): T {
  if ('inline' in ref) return ref.inline;
  throw new EngineError('unknown-reference', 'A value version was not looked up', [
    { path: `${path}/version`, message: 'This value version is not known' },
  ]);
}
