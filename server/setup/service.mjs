import { spawn } from 'node:child_process';
import { existsSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import net from 'node:net';
import path from 'node:path';
import { SetupError } from './fail.mjs';
import { root } from './paths.mjs';
import { run } from './run.mjs';

/** @throws SetupError where something listens on the port already */
export function checkPortFree(port) {
  return new Promise((resolve, reject) => {
    const server = net.createServer();
    server.on('error', (error) => {
      const said =
        error.code === 'EADDRINUSE'
          ? `Port ${port} is in use. Stop what uses it, or choose another: PORT=${port + 1} npm start`
          : `Port ${port} cannot be used: ${error.message}`;
      reject(new SetupError(said));
    });
    server.listen(port, '127.0.0.1', () => server.close(resolve));
  });
}

/** Ends a server that an earlier, killed start of the same home left running. */
export async function endLeftover(home) {
  const file = path.join(home, 'server.pid');
  if (!existsSync(file)) return;
  const pid = Number(readFileSync(file, 'utf8'));
  const commandLine = `/proc/${pid}/cmdline`;
  if (existsSync(commandLine) && readFileSync(commandLine, 'utf8').includes(path.join('dist', 'server', 'main.js'))) {
    console.log('Ending a server that an earlier start left running …');
    process.kill(pid, 'SIGTERM');
    for (let i = 0; i < 100 && existsSync(commandLine); i++) await new Promise((resolve) => setTimeout(resolve, 100));
  }
  rmSync(file, { force: true });
}

/** Migrates, grants and loads what belongs in the database. */
export async function migrate(env) {
  const { code, output } = await run(process.execPath, [path.join(root, 'dist/server/migrate.js')], {
    env,
    quiet: true,
  });
  if (code !== 0) throw new SetupError(output.trim() || 'The database could not be migrated');
}

/**
 * A long-running child of this script, in a process group of its own, so that Ctrl-C reaches it only through `stop`.
 */
export class Service {
  constructor(command, args, env, pidFile) {
    this.child = spawn(command, args, {
      cwd: root,
      env: { ...process.env, ...env },
      stdio: ['ignore', 'inherit', 'inherit'],
      detached: true,
    });
    this.pidFile = pidFile;
    if (pidFile && this.child.pid) writeFileSync(pidFile, String(this.child.pid));
    this.ended = new Promise((resolve) => {
      this.child.on('error', (error) => resolve({ code: 1, error }));
      this.child.on('exit', (code, signal) => resolve({ code: code ?? (signal ? 1 : 0) }));
    });
    void this.ended.then(() => (this.over = true));
  }

  async stop() {
    if (!this.over) {
      this.child.kill('SIGTERM');
      const timer = setTimeout(() => this.child.kill('SIGKILL'), 15_000);
      await this.ended;
      clearTimeout(timer);
    }
    if (this.pidFile) rmSync(this.pidFile, { force: true });
  }
}

/** Waits until the health route answers that all is well. */
export async function waitHealthy(port, service, seconds = 60) {
  const address = `http://127.0.0.1:${port}/api/v1/health`;
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

/** Resolves at the first Ctrl-C or SIGTERM. */
export function stopRequested() {
  return new Promise((resolve) => {
    process.once('SIGINT', () => resolve('SIGINT'));
    process.once('SIGTERM', () => resolve('SIGTERM'));
    process.once('SIGHUP', () => resolve('SIGHUP'));
  });
}
