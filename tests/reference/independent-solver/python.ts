import { spawn } from 'node:child_process';
import { existsSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import type { NetworkDocument } from '../../../shared/schemas/network.js';

const python = process.env.PYTHON_PATH ?? '/usr/bin/python3';

/** Runs a script of this folder with Debian’s Python and SciPy: JSON in, JSON out. */
function runScript(script: string, input: unknown): Promise<unknown> {
  if (!existsSync(python)) {
    const line = 'sudo apt-get update && sudo apt-get install -y python3-scipy';
    return Promise.reject(new Error(`There is no ${python}. Install it with SciPy: ${line}`));
  }
  const file = fileURLToPath(new URL(script, import.meta.url));
  return new Promise((resolve, reject) => {
    // One thread: sums are then made in the same order each time. -B: no cache is left in the sources.
    const env = { ...process.env, OMP_NUM_THREADS: '1', OPENBLAS_NUM_THREADS: '1' };
    const child = spawn(python, ['-B', file], { env, stdio: ['pipe', 'pipe', 'pipe'] });
    let output = '';
    let said = '';
    child.stdout.on('data', (data: Buffer) => (output += data.toString()));
    child.stderr.on('data', (data: Buffer) => (said += data.toString()));
    // A script that fails before it reads says so itself.
    child.stdin.on('error', () => undefined);
    child.on('error', reject);
    child.on('close', (code) => {
      if (code === 0) resolve(JSON.parse(output));
      else reject(new Error(`${script} ended with ${String(code)} (it needs Debian’s python3-scipy):\n${said}`));
    });
    child.stdin.end(JSON.stringify(input));
  });
}

export interface IndependentAnswer {
  temperaturesC: Record<string, number>;
  flowsW: Record<string, number>;
  /** Links that work near a joint of a law published in pieces. */
  nearJoints: string[];
  /** Links whose law is the greatest of several, another of which is nearly as great. */
  closeLaws: string[];
  /** Largest heat left over in a node [W]. */
  residualW: number;
}

/** The steady state of each network by the independent solver. */
export async function solveIndependently(documents: readonly NetworkDocument[]): Promise<IndependentAnswer[]> {
  return (await runScript('solve.py', documents)) as IndependentAnswer[];
}

/** A plate with even fluxes on its near side; SI units, excesses over the coolant [K]. */
export interface PlateCase {
  lx: number;
  ly: number;
  t: number;
  kxy: number;
  kz: number;
  hNear: number;
  hFar: number;
  sources: { x0: number; y0: number; lx: number; ly: number; heat: number }[];
}

export interface PlateAnswer {
  sources: { peak: number; mean: number }[];
  nearMean: number;
  nearPeak: number;
  farMean: number;
  farPeak: number;
  heatIn: number;
  heatOut: number;
  cells: [number, number, number];
  residual: number;
}

/** Each plate by the finite-volume model. */
export async function solvePlates(cases: readonly PlateCase[]): Promise<PlateAnswer[]> {
  return (await runScript('plate3d.py', cases)) as PlateAnswer[];
}
