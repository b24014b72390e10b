import { spawn } from 'node:child_process';
import { root } from './paths.mjs';

const running = new Set();

/** Ends every command that `run` has under way. */
export function endRunning() {
  for (const child of running) child.kill('SIGTERM');
}

/**
 * Runs a command to its end.
 *
 * @param {string} command
 * @param {string[]} args
 * @param {{ env?: Record<string, string | undefined>, cwd?: string, quiet?: boolean, input?: string }} [options] `quiet`: keep the output instead of showing it
 * @returns {Promise<{ code: number, output: string }>}
 */
export function run(command, args, options = {}) {
  return new Promise((resolve) => {
    const child = spawn(command, args, {
      cwd: options.cwd ?? root,
      env: { ...process.env, ...options.env },
      stdio: [
        options.input === undefined ? 'ignore' : 'pipe',
        options.quiet ? 'pipe' : 'inherit',
        options.quiet ? 'pipe' : 'inherit',
      ],
    });
    running.add(child);
    const end = (result) => {
      running.delete(child);
      resolve(result);
    };
    let output = '';
    child.stdout?.on('data', (data) => (output += data));
    child.stderr?.on('data', (data) => (output += data));
    child.on('error', (error) => end({ code: 127, output: error.message }));
    child.on('close', (code) => end({ code: code ?? 1, output }));
    if (options.input !== undefined) child.stdin?.end(options.input);
  });
}
