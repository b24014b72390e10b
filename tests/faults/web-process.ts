import { spawn, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import { createRequire } from 'node:module';
import { fileURLToPath, pathToFileURL } from 'node:url';

const root = fileURLToPath(new URL('../..', import.meta.url));
const loader = pathToFileURL(createRequire(import.meta.url).resolve('tsx')).href;

/** One of the program’s processes, run from its sources with an environment of its own. */
export class TestProcess {
  readonly child: ChildProcess;
  output = '';
  private readonly ended: Promise<number | null>;

  constructor(script: 'main' | 'migrate', environment: Record<string, string>) {
    const { PATH = '', HOME = '' } = process.env;
    this.child = spawn(process.execPath, ['--import', loader, `server/${script}.ts`], {
      cwd: root,
      env: { PATH, HOME, ...environment },
      stdio: ['ignore', 'pipe', 'pipe'],
    });
    for (const stream of [this.child.stdout, this.child.stderr]) {
      stream?.on('data', (chunk: Buffer) => (this.output += chunk.toString()));
    }
    this.ended = once(this.child, 'close').then(([code]) => code as number | null);
  }

  get isRunning(): boolean {
    return this.child.exitCode === null && this.child.signalCode === null;
  }

  /** Exit code once it has ended; null where a signal ended it. */
  exit(): Promise<number | null> {
    return this.ended;
  }

  async kill(signal: NodeJS.Signals = 'SIGTERM'): Promise<number | null> {
    this.child.kill(signal);
    return this.ended;
  }
}

/** A script’s session with a running web process. */
export class Caller {
  private cookie = '';

  constructor(private readonly base: string) {}

  async send(method: string, path: string, body?: unknown): Promise<{ status: number; type: string; body: unknown }> {
    const response = await fetch(`${this.base}${path}`, {
      method,
      headers: { Cookie: this.cookie, ...(body === undefined ? {} : { 'Content-Type': 'application/json' }) },
      ...(body === undefined ? {} : { body: JSON.stringify(body) }),
    });
    const set = response.headers.getSetCookie().map((line) => line.split(';')[0] ?? '');
    if (set.length > 0) this.cookie = set.join('; ');
    const text = await response.text();
    return {
      status: response.status,
      type: response.headers.get('content-type') ?? '',
      body: text === '' ? null : (JSON.parse(text) as unknown),
    };
  }

  /** What must not show in any log. */
  get secrets(): string[] {
    return this.cookie.split('; ').map((pair) => pair.slice(pair.indexOf('=') + 1));
  }
}

/** Asks health again until the answer has the status, or the process has ended. */
export async function waitForHealth(base: string, status: number, web: TestProcess): Promise<unknown> {
  for (;;) {
    if (!web.isRunning) throw new Error(`The server ended: ${web.output}`);
    try {
      const answer = await new Caller(base).send('GET', '/api/v1/health');
      if (answer.status === status) return answer.body;
    } catch {
      // It does not listen yet.
    }
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
}
