import path from 'node:path';
import { fileURLToPath } from 'node:url';

/** The checkout. */
export const root = fileURLToPath(new URL('../..', import.meta.url)).replace(/\/$/, '');

/** Where the private cluster, its secrets and the keys live. */
export function trimwickHome() {
  return path.resolve(root, process.env.TRIMWICK_HOME || '.local');
}
