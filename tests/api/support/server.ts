import { randomUUID } from 'node:crypto';
import { createServer, type Server } from 'node:http';
import path from 'node:path';
import os from 'node:os';
import { inject } from 'vitest';
import type { DataSource } from 'typeorm';
import { makeApp } from '../../../server/app.js';
import { readConfig } from '../../../server/config.js';
import type { AppContext } from '../../../server/context.js';
import { makeDataSource } from '../../../server/database/data-source.js';
import { makeLog } from '../../../server/log.js';
import { Workers } from '../../../server/workers/pool.js';
import { adminQuery, databaseUrl, requireUrl } from './databases.js';
import { Person } from './person.js';

export const demoPassword = 'trim-the-wick-4310';

/** The application on a database of its own, a copy of the template, with a clock that a test can put forward. */
export class TestServer {
  /** Lines of the log so far. */
  readonly logged: string[] = [];
  private offsetMs = 0;
  private readonly people = new Map<string, Promise<Person>>();

  private constructor(
    readonly database: string,
    readonly context: AppContext,
    /** With the role that owns the tables: for what no route may do. */
    readonly owner: DataSource,
    readonly http: Server,
  ) {
    context.now = () => new Date(Date.now() + this.offsetMs);
  }

  static async start(): Promise<TestServer> {
    const database = `test_${randomUUID().replaceAll('-', '')}`;
    await adminQuery(`CREATE DATABASE ${database} TEMPLATE ${inject('templateDatabase')}`);
    const config = readConfig({
      DATABASE_URL: databaseUrl(requireUrl('TEST_DATABASE_URL'), database),
      DATABASE_OWNER_URL: databaseUrl(requireUrl('TEST_DATABASE_OWNER_URL'), database),
      TRIMWICK_HOME: path.join(process.env.TRIMWICK_TEST_FOLDER ?? os.tmpdir(), database),
      SESSION_KEY: Buffer.alloc(32, 7).toString('base64url'),
      NODE_ENV: 'test',
    });
    const owner = await makeDataSource(config.ownerUrl).initialize();
    const context: AppContext = {
      config,
      dataSource: await makeDataSource(config.databaseUrl).initialize(),
      workers: new Workers(),
      background: new Set(),
      now: () => new Date(),
    };
    const lines: string[] = [];
    const http = createServer(makeApp(context, makeLog('debug', { write: (line) => lines.push(line) })));
    await new Promise<void>((resolve) => http.listen(0, '127.0.0.1', resolve));
    const server = new TestServer(database, context, owner, http);
    Object.assign(server, { logged: lines });
    return server;
  }

  /** Puts the server’s clock forward. */
  passes(ms: number): void {
    this.offsetMs += ms;
  }

  /** Somebody without a session. */
  nobody(): Person {
    return new Person(this.http);
  }

  /** A new session of a person. */
  async signIn(email: string, password = demoPassword): Promise<Person> {
    const person = new Person(this.http);
    const answer = await person.post('/api/v1/session', { email, password });
    if (answer.status !== 200) throw new Error(`${email} could not sign in: ${JSON.stringify(answer.body)}`);
    return person;
  }

  /** A demo person, signed in once per file: `engineer` of the first team, or a whole address. */
  as(who: string): Promise<Person> {
    const email = who.includes('@') ? who : `${who}@brackenmoor.example`;
    const known = this.people.get(email) ?? this.signIn(email);
    this.people.set(email, known);
    return known;
  }

  /** Waits until work behind answers, such as verdicts, is done. */
  async settled(): Promise<void> {
    while (this.context.background.size > 0) await Promise.all(this.context.background);
  }

  async stop(): Promise<void> {
    await this.settled();
    this.http.closeAllConnections();
    await new Promise((resolve) => this.http.close(resolve));
    await this.context.workers.close();
    await this.context.dataSource.destroy();
    await this.owner.destroy();
    // PostgreSQL waits some seconds by itself for the connections that are just closing.
    await adminQuery(`DROP DATABASE ${this.database}`);
  }
}
