/**
 * Order of elimination that keeps the factors of a matrix of symmetric structure sparse: always the node with fewest
 * neighbours next, its neighbours then joined to each other (the minimum-degree rule, Tinney & Walker 1967).
 *
 * @param n number of rows
 * @param pairs [i, j] of the off-diagonal entries, in any order, repeats allowed
 * @returns `order[k]` = row eliminated k-th; `pattern[k]` = rows still there that it touches (columns of U beside the diagonal)
 */
export function minimumDegree(
  n: number,
  pairs: Iterable<readonly [number, number]>,
): { order: Int32Array; pattern: Int32Array[] } {
  const neighbours = Array.from({ length: n }, () => new Set<number>());
  for (const [i, j] of pairs) {
    if (i === j) continue;
    neighbours[i]?.add(j);
    neighbours[j]?.add(i);
  }
  const order = new Int32Array(n);
  const pattern: Int32Array[] = [];
  const buckets: Set<number>[] = [];
  const bucketOf = (degree: number): Set<number> => {
    while (buckets.length <= degree) buckets.push(new Set());
    return buckets[degree] as Set<number>;
  };
  neighbours.forEach((set, i) => bucketOf(set.size).add(i));
  let least = 0;
  for (let k = 0; k < n; k++) {
    while ((buckets[least]?.size ?? 0) === 0) least++;
    const pivot = (buckets[least] as Set<number>).values().next().value as number;
    buckets[least]?.delete(pivot);
    order[k] = pivot;
    const clique = [...(neighbours[pivot] as Set<number>)];
    pattern.push(Int32Array.from(clique));
    for (const i of clique) {
      const set = neighbours[i] as Set<number>;
      buckets[set.size]?.delete(i);
      set.delete(pivot);
      for (const j of clique) if (j !== i) set.add(j);
      bucketOf(set.size).add(i);
      if (set.size < least) least = set.size;
    }
    neighbours[pivot]?.clear();
  }
  return { order, pattern };
}
