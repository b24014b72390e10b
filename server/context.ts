import type { DataSource } from 'typeorm';
import type { Role } from '../shared/roles.js';
import type { Config } from './config.js';
import type { Workers } from './workers/pool.js';

/** What every service works with. */
export interface AppContext {
  config: Config;
  dataSource: DataSource;
  workers: Workers;
  /** Work that goes on after an answer; waited for when the server stops. */
  background: Set<Promise<unknown>>;
  now: () => Date;
}

/** Who asks: a signed-in person in one team, with roles as of this request. */
export interface Actor {
  userId: string;
  name: string;
  email: string;
  teamId: string;
  teamName: string;
  roles: Role[];
  sessionId: string;
}

/** Lets work go on after the answer; its failure is its own affair and must not end the process. */
export function inBackground(context: AppContext, work: Promise<unknown>): void {
  const settled = work.catch(() => undefined).finally(() => context.background.delete(settled));
  context.background.add(settled);
}
