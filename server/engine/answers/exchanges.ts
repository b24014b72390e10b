import { edgeFlowId, edgeJoinFlowId } from '../network/grid-names.js';
import type { NetworkDocument } from '../../../shared/schemas/network.js';
import type { NetworkGrid } from '../../../shared/schemas/network-grid.js';
import type { SolveAnswer } from '../../../shared/schemas/network-answers.js';

/** Heat that passes from one named place to another [W], by the link that carries it. */
export interface Exchange {
  from: string;
  to: string;
  flowW: number;
  link: string;
}

/** The places of a grid by which a reader follows heat: where it enters, where it lies, where it leaves on either side. */
function places(grid: NetworkGrid) {
  const readings = new Set(grid.readings.map(({ id }) => id));
  const mean = `${grid.id}.mean`;
  // A wall is followed from the mean under what lies on it to the mean of its outside; a carrier by its mean alone.
  const isWall = grid.free.near !== undefined;
  if (!isWall && readings.has(mean)) return { entry: () => mean, near: mean, far: mean };
  const inner = grid.free.near ?? grid.id;
  const outer = grid.free.far ?? grid.id;
  const under = (what: string) => `${grid.id}.mean.${what}`;
  return { entry: (what: string) => (readings.has(under(what)) ? under(what) : outer), near: inner, far: outer };
}

/** Last part of an id: the part or carrier that it speaks of. */
function lastOf(id: string): string {
  return id.slice(id.lastIndexOf('.') + 1);
}

/** Heat flowing into a node through the links of the document [W]. */
function inflow(document: NetworkDocument, answer: SolveAnswer, node: string): number {
  return document.links.reduce((sum, link, i) => {
    const flow = answer.flowsW[link.id ?? `link-${String(i + 1)}`] ?? 0;
    if (link.to === node) return sum + flow;
    return link.from === node ? sum - flow : sum;
  }, 0);
}

/**
 * All heat flows between named places: the links of the document, and of each grid what enters it at its patches and joins and what leaves
 * it over its sides.
 */
export function exchanges(document: NetworkDocument, answer: SolveAnswer): Exchange[] {
  const flowOf = (id: string) => answer.flowsW[id] ?? 0;
  const found: Exchange[] = document.links.map((link, i) => {
    const name = link.id ?? `link-${String(i + 1)}`;
    return { from: link.from, to: link.to, flowW: flowOf(name), link: name };
  });
  const byId = new Map(document.grids.map((grid) => [grid.id, grid]));
  // Heat that has come to the far side of each grid, through it or over its edges, less what has left it there [W].
  const farBalance = new Map<string, number>(document.grids.map(({ id }) => [id, 0]));
  const addFar = (grid: string, flowW: number) => farBalance.set(grid, (farBalance.get(grid) ?? 0) + flowW);
  for (const grid of document.grids) {
    const own = places(grid);
    const twoSided = own.near !== own.far;
    const enter = (from: string, what: string, flowW: number, link: string) => {
      const entry = own.entry(what);
      found.push({ from, to: entry, flowW, link });
      if (entry !== own.far) found.push({ from: entry, to: own.far, flowW, link: `${grid.id}.through` });
      addFar(grid.id, flowW);
    };
    for (const { node } of grid.patches) enter(node, lastOf(node), inflow(document, answer, node), `${node}.spread`);
    for (const surface of grid.surfaces) {
      const from = surface.side === 'near' ? own.near : own.far;
      found.push({ from, to: surface.to, flowW: flowOf(surface.id), link: surface.id });
      if (surface.side === 'far') addFar(grid.id, -flowOf(surface.id));
    }
    for (const join of grid.joins) {
      const other = byId.get(join.grid);
      if (!other) continue;
      // The flow counts from this grid to the other; a plate or board on a wall gives its heat the other way.
      const from = places(other);
      const flowW = -flowOf(join.id) - flowOf(`${join.id}.radiation`);
      if (join.side === 'far') {
        found.push({ from: own.far, to: from.near, flowW: -flowW, link: join.id });
        addFar(grid.id, flowW);
      } else enter(join.gridSide === 'near' ? from.near : from.far, lastOf(join.grid), flowW, join.id);
    }
    grid.edges.forEach(({ near, far }, e) => {
      for (const half of ['near', 'far'] as const) {
        const link = edgeFlowId(grid.id, e, half);
        const from = half === 'near' ? own.near : own.far;
        found.push({ from, to: half === 'near' ? near : far, flowW: flowOf(link), link });
        if (half === 'far' || !twoSided) addFar(grid.id, -flowOf(link));
      }
    });
    grid.edgeJoins.forEach((join, e) => {
      const other = byId.get(join.grid);
      if (!other) return;
      const link = edgeJoinFlowId(grid.id, e);
      found.push({ from: own.far, to: places(other).far, flowW: flowOf(link), link });
      addFar(grid.id, -flowOf(link));
      addFar(other.id, flowOf(link));
    });
  }
  for (const grid of document.grids) {
    const own = places(grid);
    if (own.near === own.far) continue;
    // What the far side still lacks has come through the bare part of the near side.
    const sun = document.nodes.find(({ id }) => id === own.far)?.heatW ?? 0;
    // The document’s own links to the far side’s node count as well.
    const links = inflow(document, answer, own.far);
    const flowW = -(farBalance.get(grid.id) ?? 0) - sun - links;
    found.push({ from: own.near, to: own.far, flowW, link: `${grid.id}.through` });
  }
  return found;
}
