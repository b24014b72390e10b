import { existsSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { SetupError } from './fail.mjs';

/** Longest that a process left behind may take to end before it is killed [ms]. */
const patienceMs = 15_000;

/**
 * When a process began, in the kernel’s own count: with the number it names one process for good, though numbers are
 * used again. Undefined where there is no such process.
 */
export function beginning(pid) {
  try {
    const line = readFileSync(`/proc/${pid}/stat`, 'utf8');
    // The name, in brackets, may hold blanks: fields are counted behind it. Field 22 of all.
    const fields = line.slice(line.lastIndexOf(')') + 2).split(' ');
    return fields[0] === 'Z' ? undefined : fields[19];
  } catch {
    return undefined;
  }
}

/** Notes a process in a file, so that a later start can tell whether it still runs. */
export function noteProcess(file, pid, more = {}) {
  writeFileSync(file, JSON.stringify({ pid, began: beginning(pid), ...more }));
}

/**
 * What a file notes, where that process still runs.
 *
 * @returns {{ pid: number, began: string, port?: number } | undefined}
 */
export function notedProcess(file) {
  if (!existsSync(file)) return undefined;
  try {
    const noted = JSON.parse(readFileSync(file, 'utf8'));
    if (noted.began !== undefined && beginning(noted.pid) === noted.began) return noted;
  } catch {
    // Half written by a process that was killed: nothing runs under it.
  }
  return undefined;
}

function startFile(home) {
  return path.join(home, 'start.pid');
}

/**
 * Takes a home for this process: two starts on one home would stop each other’s database.
 *
 * @throws SetupError where another start has it
 */
export function takeHome(home, port) {
  const holder = notedProcess(startFile(home));
  if (holder) {
    throw new SetupError(
      holder.port === port
        ? `Port ${port} is in use: Trimwick already runs from ${home} (process ${holder.pid})`
        : `Trimwick already runs from ${home}, on port ${holder.port} (process ${holder.pid}). Stop it, or choose another TRIMWICK_HOME`,
    );
  }
  noteProcess(startFile(home), process.pid, { port });
}

export function leaveHome(home) {
  if (notedProcess(startFile(home))?.pid === process.pid) rmSync(startFile(home), { force: true });
}

function signalGroup(pid, signal) {
  try {
    process.kill(-pid, signal);
  } catch (error) {
    if (error.code !== 'ESRCH') throw error;
  }
}

/** Waits until a file notes no running process, for a while. */
async function waitGone(file) {
  for (const end = Date.now() + patienceMs; notedProcess(file) && Date.now() < end;)
    await new Promise((resolve) => setTimeout(resolve, 50));
}

/** Ends the start that has a home, if any. */
export async function endStart(home) {
  const holder = notedProcess(startFile(home));
  if (!holder) return;
  process.kill(holder.pid, 'SIGTERM');
  await waitGone(startFile(home));
}

/** Ends the services that an earlier start of this home left when it was killed. */
export async function endLeftovers(home) {
  for (const name of ['server', 'client']) {
    const file = path.join(home, `${name}.pid`);
    const left = notedProcess(file);
    if (left) {
      console.log(`Ending a ${name} that an earlier start left running …`);
      signalGroup(left.pid, 'SIGTERM');
      await waitGone(file);
      signalGroup(left.pid, 'SIGKILL');
    }
    rmSync(file, { force: true });
  }
}
