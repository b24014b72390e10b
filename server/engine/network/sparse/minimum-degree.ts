/** An undirected graph in compressed rows: neighbours of i are `adjacent[start[i]] … adjacent[start[i + 1] − 1]`, none twice, never i. */
export interface Graph {
  n: number;
  start: Int32Array;
  adjacent: Int32Array;
}

/**
 * Order of elimination that keeps the factors of a matrix of symmetric structure sparse: always a node of least (approximate)
 * degree next, its neighbours then joined to each other. The joined neighbourhoods are kept as elements (a quotient graph), so that
 * the work grows with the fill and not with its square.
 *
 * Nodes of very many neighbours (air, mean temperatures) would slow this and end up last anyhow: they are set aside and put last.
 *
 * @param late nodes to be put last, in this order, whatever their degree
 * @returns `order[k]` = node eliminated k-th
 *
 * **Source** the minimum-degree rule, W. F. Tinney, J. W. Walker, Proc. IEEE 55 (1967) 1801; quotient graph and approximate degree after
 * P. R. Amestoy, T. A. Davis, I. S. Duff, SIAM J. Matrix Anal. Appl. 17 (1996) 886.
 * **Checked against** the fill of known grids and the solutions of random systems, tests/engine/network/sparse.
 */
export function minimumDegree(graph: Graph, late: readonly number[] = []): Int32Array {
  const { n, start } = graph;
  const iw = Int32Array.from(graph.adjacent);
  const order = new Int32Array(n);
  // Per variable: its elements stand first in its stretch of iw, then the neighbours that are still variables.
  const elementCount = new Int32Array(n);
  const variableCount = new Int32Array(n);
  const state = new Int8Array(n); // 0 variable, 1 eliminated, 2 set aside
  for (const i of late) state[i] = 2;
  const dense = Math.max(16, 10 * Math.sqrt(n));
  const aside: number[] = [];
  for (let i = 0; i < n; i++) {
    if (state[i] === 0 && (start[i + 1] as number) - (start[i] as number) > dense) {
      state[i] = 2;
      aside.push(i);
    }
  }
  const degreeOf = (i: number) => (start[i + 1] as number) - (start[i] as number);
  aside.sort((a, b) => degreeOf(a) - degreeOf(b));

  const head = new Int32Array(n + 1).fill(-1);
  const next = new Int32Array(n).fill(-1);
  const previous = new Int32Array(n).fill(-1);
  const degree = new Int32Array(n);
  const unlink = (i: number) => {
    const before = previous[i] as number;
    const after = next[i] as number;
    if (before >= 0) next[before] = after;
    else head[degree[i] as number] = after;
    if (after >= 0) previous[after] = before;
  };
  const insert = (i: number, d: number) => {
    degree[i] = d;
    const first = head[d] as number;
    next[i] = first;
    previous[i] = -1;
    if (first >= 0) previous[first] = i;
    head[d] = i;
  };

  for (let i = 0; i < n; i++) {
    if (state[i] !== 0) continue;
    const base = start[i] as number;
    const end = start[i + 1] as number;
    let kept = base;
    for (let p = base; p < end; p++) {
      const j = iw[p] as number;
      if (state[j] === 0) iw[kept++] = j;
    }
    variableCount[i] = kept - base;
    insert(i, kept - base);
  }

  // Members of each element, one after the other in a buffer that grows.
  let buffer = new Int32Array(Math.max(64, 4 * graph.adjacent.length));
  let used = 0;
  const elementStart = new Int32Array(n);
  const elementSize = new Int32Array(n);
  const absorbed = new Uint8Array(n);
  const mark = new Int32Array(n).fill(-1);
  const outside = new Int32Array(n);
  const outsideMark = new Int32Array(n).fill(-1);

  let least = 0;
  const variables = n - aside.length - late.length;
  for (let k = 0; k < variables; k++) {
    while ((head[least] as number) < 0) least++;
    const pivot = head[least] as number;
    unlink(pivot);
    state[pivot] = 1;
    order[k] = pivot;
    mark[pivot] = k;

    // The new element: neighbours of the pivot, and members of its elements, which it absorbs.
    const base = start[pivot] as number;
    const elements = elementCount[pivot] as number;
    const variablesEnd = base + elements + (variableCount[pivot] as number);
    let room = variablesEnd - base;
    for (let p = base; p < base + elements; p++) room += elementSize[iw[p] as number] as number;
    if (used + room > buffer.length) {
      const larger = new Int32Array(2 * (used + room));
      larger.set(buffer.subarray(0, used));
      buffer = larger;
    }
    const from = used;
    for (let p = base; p < base + elements; p++) {
      const e = iw[p] as number;
      absorbed[e] = 1;
      const eEnd = (elementStart[e] as number) + (elementSize[e] as number);
      for (let q = elementStart[e] as number; q < eEnd; q++) {
        const j = buffer[q] as number;
        if (state[j] === 0 && mark[j] !== k) {
          mark[j] = k;
          buffer[used++] = j;
        }
      }
    }
    for (let p = base + elements; p < variablesEnd; p++) {
      const j = iw[p] as number;
      if (state[j] === 0 && mark[j] !== k) {
        mark[j] = k;
        buffer[used++] = j;
      }
    }
    elementStart[pivot] = from;
    elementSize[pivot] = used - from;
    const size = used - from;

    // How much of each neighbouring element lies outside the new one.
    for (let q = from; q < used; q++) {
      const i = buffer[q] as number;
      const iBase = start[i] as number;
      const iEnd = iBase + (elementCount[i] as number);
      for (let p = iBase; p < iEnd; p++) {
        const e = iw[p] as number;
        if (absorbed[e] === 1) continue;
        if (outsideMark[e] !== k) {
          outsideMark[e] = k;
          let alive = 0;
          const eStart = elementStart[e] as number;
          const eEnd = eStart + (elementSize[e] as number);
          for (let r = eStart; r < eEnd; r++)
            if (state[buffer[r] as number] === 0) buffer[eStart + alive++] = buffer[r] as number;
          elementSize[e] = alive;
          outside[e] = alive;
        }
        outside[e] = (outside[e] as number) - 1;
      }
    }
    const remaining = variables - k - 1;
    for (let q = from; q < used; q++) {
      const i = buffer[q] as number;
      unlink(i);
      const iBase = start[i] as number;
      const iElements = elementCount[i] as number;
      const iEnd = iBase + iElements + (variableCount[i] as number);
      let write = iBase;
      let d = size - 1;
      for (let p = iBase; p < iBase + iElements; p++) {
        const e = iw[p] as number;
        if (absorbed[e] === 1) continue;
        const beyond = outside[e] as number;
        // An element that lies wholly inside the new one says nothing more.
        if (beyond === 0) continue;
        iw[write++] = e;
        d += beyond;
      }
      let keptElements = write - iBase;
      // The new element takes one place; what is moved on has always left one.
      const variablesFrom = iBase + iElements;
      let neighbours = 0;
      const firstFree = write;
      for (let p = variablesFrom; p < iEnd; p++) {
        const j = iw[p] as number;
        if (state[j] !== 0 || mark[j] === k) continue;
        neighbours++;
      }
      // Shift the variables behind the element list plus the new element.
      let target = firstFree + 1;
      if (target <= variablesFrom) {
        for (let p = variablesFrom; p < iEnd; p++) {
          const j = iw[p] as number;
          if (state[j] !== 0 || mark[j] === k) continue;
          iw[target++] = j;
        }
      } else {
        // No element has gone: a variable (the pivot) has; compact in place, then move the first behind the new element.
        let compact = variablesFrom;
        for (let p = variablesFrom; p < iEnd; p++) {
          const j = iw[p] as number;
          if (state[j] !== 0 || mark[j] === k) continue;
          iw[compact++] = j;
        }
        for (let p = compact; p > variablesFrom; p--) iw[p] = iw[p - 1] as number;
      }
      iw[firstFree] = pivot;
      keptElements++;
      elementCount[i] = keptElements;
      variableCount[i] = neighbours;
      d += neighbours;
      const capped = Math.min(d, remaining);
      insert(i, capped);
      if (capped < least) least = capped;
    }
  }
  let k = variables;
  for (const i of aside) order[k++] = i;
  for (const i of late) order[k++] = i;
  return order;
}
