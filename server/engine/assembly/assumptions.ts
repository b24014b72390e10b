import type { Default } from './defaults.js';

/** One default in use, with every field that takes it. */
export interface Assumption {
  key: string;
  label: string;
  paths: string[];
  value: number | string;
  typical: number | string;
  source: string;
}

/**
 * Keeps the list of defaults that a document needs. `typical` names the keys that shall take their typical value
 * instead of the cautious one: that is how each assumption’s worth in kelvin is found.
 */
export class Assumptions {
  private readonly taken = new Map<string, Assumption>();

  constructor(private readonly typical: ReadonlySet<string> = new Set()) {}

  /** The value itself where it is known, else the default, noted under its path. */
  fill<T extends number | string>(known: T | null | undefined, path: string, key: string, preset: Default<T>): T {
    if (known !== null && known !== undefined) return known;
    this.note(path, key, preset);
    return this.typical.has(key) ? preset.typical : preset.cautious;
  }

  /** True when the key takes its typical value. */
  isTypical(key: string): boolean {
    return this.typical.has(key);
  }

  note(path: string, key: string, preset: Default<number | string>): void {
    const entry = this.taken.get(key);
    if (entry) {
      if (!entry.paths.includes(path)) entry.paths.push(path);
      return;
    }
    this.taken.set(key, {
      key,
      label: preset.label,
      paths: [path],
      value: preset.cautious,
      typical: preset.typical,
      source: preset.source,
    });
  }

  list(): Assumption[] {
    return [...this.taken.values()];
  }
}
