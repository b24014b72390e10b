import { minimumDegree, type Graph } from './minimum-degree.js';

/**
 * Everything about a factorisation that depends on the structure alone: order, where each entry stands, and the patterns of L and U.
 * Positions count in the order of elimination.
 */
export interface EliminationPlan {
  n: number;
  order: Int32Array;
  /** Off-diagonal entries of A; of pair p, (i, j) stands at `pairSlots[2p]` and (j, i) at `pairSlots[2p + 1]`. */
  entries: number;
  pairSlots: Int32Array;
  /** Rows of A in elimination order: columns (positions) and slots. */
  aStart: Int32Array;
  aColumn: Int32Array;
  aSlot: Int32Array;
  /** Rows of U right of the diagonal, and rows of L left of it, ascending. */
  uStart: Int32Array;
  uColumn: Int32Array;
  lStart: Int32Array;
  lColumn: Int32Array;
}

/** Compressed rows of the pairs, repeats merged, with the slot of each pair’s two entries. */
function compressPairs(n: number, pairs: Int32Array): { graph: Graph; pairSlots: Int32Array } {
  const count = pairs.length / 2;
  const rowEnd = new Int32Array(n + 1);
  for (let p = 0; p < pairs.length; p++)
    rowEnd[(pairs[p] as number) + 1] = (rowEnd[(pairs[p] as number) + 1] as number) + 1;
  for (let i = 0; i < n; i++) rowEnd[i + 1] = (rowEnd[i + 1] as number) + (rowEnd[i] as number);
  const fill = rowEnd.slice(0, n);
  const column = new Int32Array(pairs.length);
  const owner = new Int32Array(pairs.length);
  for (let p = 0; p < count; p++) {
    const i = pairs[2 * p] as number;
    const j = pairs[2 * p + 1] as number;
    let at = fill[i] as number;
    fill[i] = at + 1;
    column[at] = j;
    owner[at] = 2 * p;
    at = fill[j] as number;
    fill[j] = at + 1;
    column[at] = i;
    owner[at] = 2 * p + 1;
  }
  const pairSlots = new Int32Array(pairs.length);
  const start = new Int32Array(n + 1);
  const seen = new Int32Array(n).fill(-1);
  let slots = 0;
  for (let i = 0; i < n; i++) {
    const first = slots;
    for (let p = rowEnd[i] as number; p < (rowEnd[i + 1] as number); p++) {
      const j = column[p] as number;
      const known = seen[j] as number;
      if (known >= first) pairSlots[owner[p] as number] = known;
      else {
        seen[j] = slots;
        pairSlots[owner[p] as number] = slots;
        column[slots++] = j;
      }
    }
    start[i + 1] = slots;
  }
  return { graph: { n, start, adjacent: column.subarray(0, slots) }, pairSlots };
}

/** Rows of A in elimination order, columns as positions. */
function permuteRows(graph: Graph, order: Int32Array, position: Int32Array) {
  const { n, start, adjacent } = graph;
  const aStart = new Int32Array(n + 1);
  const aColumn = new Int32Array(adjacent.length);
  const aSlot = new Int32Array(adjacent.length);
  let at = 0;
  for (let k = 0; k < n; k++) {
    const row = order[k] as number;
    for (let p = start[row] as number; p < (start[row + 1] as number); p++) {
      aColumn[at] = position[adjacent[p] as number] as number;
      aSlot[at++] = p;
    }
    aStart[k + 1] = at;
  }
  return { aStart, aColumn, aSlot };
}

/** Patterns of the factors from the elimination tree: row i of L is what the tree’s paths from A’s entries left of i pass. */
function factorPatterns(n: number, aStart: Int32Array, aColumn: Int32Array) {
  const parent = new Int32Array(n).fill(-1);
  const ancestor = new Int32Array(n).fill(-1);
  for (let i = 0; i < n; i++) {
    for (let p = aStart[i] as number; p < (aStart[i + 1] as number); p++) {
      let k = aColumn[p] as number;
      while (k >= 0 && k < i) {
        const up = ancestor[k] as number;
        ancestor[k] = i;
        if (up < 0) {
          parent[k] = i;
          break;
        }
        k = up;
      }
    }
  }
  const mark = new Int32Array(n).fill(-1);
  const uStart = new Int32Array(n + 1);
  const lStart = new Int32Array(n + 1);
  for (let i = 0; i < n; i++) {
    mark[i] = i;
    let length = 0;
    for (let p = aStart[i] as number; p < (aStart[i + 1] as number); p++) {
      for (let k = aColumn[p] as number; k < i && mark[k] !== i; k = parent[k] as number) {
        mark[k] = i;
        uStart[k + 1] = (uStart[k + 1] as number) + 1;
        length++;
      }
    }
    lStart[i + 1] = (lStart[i] as number) + length;
  }
  for (let i = 0; i < n; i++) uStart[i + 1] = (uStart[i + 1] as number) + (uStart[i] as number);
  const uColumn = new Int32Array(uStart[n] as number);
  const lColumn = new Int32Array(uStart[n] as number);
  const fill = uStart.slice(0, n);
  mark.fill(-1);
  for (let i = 0; i < n; i++) {
    mark[i] = i;
    for (let p = aStart[i] as number; p < (aStart[i + 1] as number); p++) {
      for (let k = aColumn[p] as number; k < i && mark[k] !== i; k = parent[k] as number) {
        mark[k] = i;
        const at = fill[k] as number;
        uColumn[at] = i;
        fill[k] = at + 1;
      }
    }
  }
  // Row i of L has k where row k of U has i; taken by rising k, so each row comes out ascending.
  const lFill = lStart.slice(0, n);
  for (let k = 0; k < n; k++) {
    for (let p = uStart[k] as number; p < (uStart[k + 1] as number); p++) {
      const i = uColumn[p] as number;
      const at = lFill[i] as number;
      lColumn[at] = k;
      lFill[i] = at + 1;
    }
  }
  return { uStart, uColumn, lStart, lColumn };
}

function makePlan(n: number, pairs: Int32Array, late: readonly number[]): EliminationPlan {
  const { graph, pairSlots } = compressPairs(n, pairs);
  const order = minimumDegree(graph, late);
  const position = new Int32Array(n);
  for (let k = 0; k < n; k++) position[order[k] as number] = k;
  const rows = permuteRows(graph, order, position);
  return {
    n,
    order,
    entries: graph.adjacent.length,
    pairSlots,
    ...rows,
    ...factorPatterns(n, rows.aStart, rows.aColumn),
  };
}

/** Plans of the structures met last: a sheet solves the same structure again and again with other numbers. */
const kept: { n: number; pairs: Int32Array; late: string; plan: EliminationPlan }[] = [];
const mostKept = 12;
/** Plans of larger structures than this are not kept [pairs]. */
const largestKept = 60000;

function sameNumbers(a: Int32Array, b: Int32Array): boolean {
  if (a.length !== b.length) return false;
  for (let i = 0; i < a.length; i++) if (a[i] !== b[i]) return false;
  return true;
}

/**
 * The plan for a matrix with entries at the given pairs (and the diagonal).
 *
 * @param pairs i, j, i, j … with i ≠ j; repeats allowed
 * @param late rows to be eliminated last, in this order
 */
export function eliminationPlan(n: number, pairs: Int32Array, late: readonly number[]): EliminationPlan {
  const lateKey = late.join();
  const found = kept.findIndex((entry) => entry.n === n && entry.late === lateKey && sameNumbers(entry.pairs, pairs));
  if (found >= 0) {
    const [entry] = kept.splice(found, 1) as [(typeof kept)[number]];
    kept.push(entry);
    return entry.plan;
  }
  const plan = makePlan(n, pairs, late);
  if (pairs.length <= 2 * largestKept) {
    kept.push({ n, pairs, late: lateKey, plan });
    if (kept.length > mostKept) kept.shift();
  }
  return plan;
}

/** Forgets the plans kept: the next network pays for its own. */
export function forgetPlans(): void {
  kept.length = 0;
}
