import { chmodSync, existsSync, mkdirSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';

/** The checkout. */
export const root = fileURLToPath(new URL('../..', import.meta.url)).replace(/\/$/, '');

/** Where the private cluster, its secrets and the keys live. */
export function trimwickHome() {
  return path.resolve(root, process.env.TRIMWICK_HOME || '.local');
}

/** Makes a home where there is none. What is secret in it has its own rights; the database’s account must be able to enter. */
export function ensureHome(home) {
  if (existsSync(home)) return;
  mkdirSync(home, { recursive: true });
  chmodSync(home, 0o755);
}

/** A program that came with the packages. */
export function packaged(name) {
  return path.join(root, 'node_modules', '.bin', name);
}
