import { spawn } from 'node:child_process';
import { rmSync } from 'node:fs';
import net from 'node:net';
import path from 'node:path';
import { SetupError } from './fail.mjs';
import { root } from './paths.mjs';
import { noteProcess } from './processes.mjs';
import { run } from './run.mjs';

/** Longest that a service may take to end before it is killed [ms]. */
const patienceMs = 15_000;

/** @throws SetupError where the setting is no port number */
export function readPort(name, otherwise) {
  const port = Number(process.env[name] || otherwise);
  if (Number.isInteger(port) && port >= 1 && port <= 65535) return port;
  throw new SetupError(`${name} must be a port number, not “${process.env[name]}”`);
}

/** @throws SetupError where something listens on the port already */
export function checkPortFree(port, setting = 'PORT') {
  return new Promise((resolve, reject) => {
    const server = net.createServer();
    server.on('error', (error) => {
      const said =
        error.code === 'EADDRINUSE'
          ? `Port ${port} is in use. Stop what uses it, or choose another with ${setting}=…`
          : `Port ${port} cannot be used: ${error.message}`;
      reject(new SetupError(said));
    });
    server.listen(port, '127.0.0.1', () => server.close(resolve));
  });
}

/** Migrates, grants and loads what belongs in the database. */
export async function migrate(env, command = [process.execPath, path.join(root, 'dist/server/migrate.js')]) {
  const { code, output } = await run(command[0], command.slice(1), { env, quiet: true });
  if (code !== 0) {
    throw new SetupError(output.trim().replace(/^trimwick: /, '') || 'The database could not be migrated');
  }
}

/** The built web process, as `npm start` and the browser tests run it. */
export function webProcess(env, pidFile) {
  return new Service(process.execPath, [path.join(root, 'dist/server/main.js')], env, pidFile);
}

/** A long-running child of this script, in a process group of its own, so that Ctrl-C reaches it only through `stop`. */
export class Service {
  constructor(command, args, env, pidFile) {
    this.child = spawn(command, args, {
      cwd: root,
      env: { ...process.env, ...env },
      stdio: ['ignore', 'inherit', 'inherit'],
      detached: true,
    });
    this.pidFile = pidFile;
    this.over = false;
    if (pidFile && this.child.pid) noteProcess(pidFile, this.child.pid);
    this.ended = new Promise((resolve) => {
      this.child.on('error', (error) => resolve({ code: 1, error }));
      this.child.on('exit', (code, signal) => resolve({ code: code ?? (signal ? 1 : 0) }));
    });
    void this.ended.then(() => (this.over = true));
  }

  signal(name) {
    try {
      process.kill(-this.child.pid, name);
    } catch (error) {
      if (error.code !== 'ESRCH') throw error;
    }
  }

  async stop() {
    if (!this.over && this.child.pid) {
      this.signal('SIGTERM');
      const timer = setTimeout(() => this.signal('SIGKILL'), patienceMs);
      await this.ended;
      clearTimeout(timer);
    }
    if (this.pidFile) rmSync(this.pidFile, { force: true });
  }
}

/** Address at which this machine reaches the program, whatever it listens on. */
export function ownAddress(port, host = process.env.HOST) {
  if (!host || host === '0.0.0.0' || host === '::') return `http://127.0.0.1:${port}`;
  return host.includes(':') ? `http://[${host}]:${port}` : `http://${host}:${port}`;
}

/** Waits until the health route answers that all is well. */
export async function waitHealthy(base, service, seconds = 60) {
  const address = `${base}/api/v1/health`;
  let said = '';
  for (const end = Date.now() + seconds * 1000; Date.now() < end;) {
    if (service.over) throw new SetupError('The server ended while starting (see above)');
    try {
      const response = await fetch(address);
      said = await response.text();
      if (response.ok) return;
    } catch {
      // Not listening yet.
    }
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
  throw new SetupError(`The server did not become healthy within ${seconds} s${said ? `: ${said}` : ''}`);
}

/**
 * Resolves at the first Ctrl-C, SIGTERM or hang-up. Later ones change nothing: a terminal and npm both pass on the same
 * Ctrl-C, and the database must still be stopped.
 */
export function stopRequested() {
  return new Promise((resolve) => {
    for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, () => resolve(signal));
  });
}
