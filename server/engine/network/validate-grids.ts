import type { NetworkDocument } from '../../../shared/schemas/network.js';
import type { NetworkGrid } from '../../../shared/schemas/network-grid.js';
import { findCorrelation, type ConvectionShape } from '../convection/registry.js';
import type { Findings } from './findings.js';

/** Slack when positions typed in millimetres are compared [m]. */
const slack = 1e-9;

interface Rectangle {
  xM: number;
  yM: number;
  sizeM: readonly [number, number];
}

function liesOn({ sizeM }: NetworkGrid, rectangle: Rectangle): boolean {
  return ([0, 1] as const).every((axis) => {
    const from = axis === 0 ? rectangle.xM : rectangle.yM;
    return from >= -slack && from + rectangle.sizeM[axis] <= sizeM[axis] + slack;
  });
}

/** What a grid names, with where in it: nodes must be there, other grids too. */
function namesOf(grid: NetworkGrid): { path: string; node?: string; grid?: string }[] {
  return [
    ...grid.patches.map(({ node }, i) => ({ path: `patches/${String(i)}/node`, node })),
    ...Object.entries(grid.free).map(([side, node]) => ({ path: `free/${side}`, node })),
    ...grid.surfaces.map(({ to }, i) => ({ path: `surfaces/${String(i)}/to`, node: to })),
    ...grid.joins.map((join, i) => ({ path: `joins/${String(i)}/grid`, grid: join.grid })),
    ...grid.edges.flatMap(({ near, far }, i) => [
      { path: `edges/${String(i)}/near`, node: near },
      { path: `edges/${String(i)}/far`, node: far },
    ]),
    ...grid.edgeJoins.map((join, i) => ({ path: `edgeJoins/${String(i)}/grid`, grid: join.grid })),
  ];
}

/**
 * Checks the grids of a document: ids, what they name, rectangles that hang over, nodes that are joined twice.
 *
 * @returns ids of all readings, which limits may name as they name nodes
 */
export function checkGrids(
  document: NetworkDocument,
  nodes: ReadonlyMap<string, number>,
  findings: Findings,
): Set<string> {
  const readings = new Set<string>();
  if (document.grids.length === 0) return readings;
  const ids = new Set(document.grids.map(({ id }) => id));
  const seen = new Set<string>();
  const patched = new Set<string>();
  document.grids.forEach((grid, g) => {
    const path = `/grids/${String(g)}`;
    if (seen.has(grid.id)) {
      findings.add('duplicate-id', { path: `${path}/id`, message: `Two grids have the id “${grid.id}”` });
    }
    seen.add(grid.id);
    for (const name of namesOf(grid)) {
      if (name.node !== undefined && !nodes.has(name.node)) {
        const message = `Grid “${grid.id}” names a node “${name.node}” that is not there`;
        findings.add('unknown-reference', { path: `${path}/${name.path}`, message, node: name.node });
      }
      if (name.grid !== undefined && (!ids.has(name.grid) || name.grid === grid.id)) {
        const message = `Grid “${grid.id}” names a grid “${name.grid}” that is not there`;
        findings.add('unknown-reference', { path: `${path}/${name.path}`, message });
      }
    }
    for (const node of [...grid.patches.map((patch) => patch.node), ...Object.values(grid.free)]) {
      const at = nodes.get(node);
      const fixed = at !== undefined && document.nodes[at]?.fixedC !== undefined;
      if (patched.has(node) || fixed) {
        const message = fixed
          ? `“${node}” has a fixed temperature and cannot stand for the mean of cells`
          : `“${node}” stands for cells in two places`;
        findings.add('invalid-document', { path: `${path}/patches`, message, node });
      }
      patched.add(node);
    }
    grid.patches.forEach((patch, i) => {
      if (liesOn(grid, patch)) return;
      const message = `“${patch.node}” hangs over the edge of “${grid.id}”`;
      findings.add('invalid-document', { path: `${path}/patches/${String(i)}`, message, node: patch.node });
    });
    grid.surfaces.forEach((surface, i) => {
      if (surface.kind !== 'convection') return;
      const known = findCorrelation(surface.shape as ConvectionShape, surface.correlation);
      if (known) return;
      const message = `There is no correlation for the shape “${surface.shape}” of “${surface.id}”`;
      findings.add('unknown-reference', { path: `${path}/surfaces/${String(i)}/shape`, message, link: surface.id });
    });
    grid.readings.forEach(({ id, over }, i) => {
      if (readings.has(id) || nodes.has(id)) {
        findings.add('duplicate-id', {
          path: `${path}/readings/${String(i)}/id`,
          message: `Two nodes or readings have the id “${id}”`,
        });
      }
      readings.add(id);
      if (over && !liesOn(grid, over)) {
        const message = `The reading “${id}” lies outside “${grid.id}”`;
        findings.add('invalid-document', { path: `${path}/readings/${String(i)}/over`, message });
      }
    });
  });
  return readings;
}

/**
 * Joins what a grid joins, for the search of paths to a fixed temperature: all that it touches hangs together.
 *
 * @param nodeAt position of a node; @param gridAt position of a grid among all
 */
export function joinGrids(
  grids: readonly NetworkGrid[],
  nodeAt: (id: string) => number,
  gridAt: (index: number) => number,
  join: (a: number, b: number) => void,
): void {
  const indexOf = new Map(grids.map(({ id }, g) => [id, g]));
  grids.forEach((grid, g) => {
    const touched = [
      ...grid.patches.map(({ node }) => node),
      ...Object.values(grid.free),
      ...grid.surfaces.flatMap((surface) => (surfaceCarries(surface) ? [surface.to] : [])),
      ...grid.edges.flatMap(({ near, far }) => [near, far]),
    ];
    for (const node of touched) join(gridAt(g), nodeAt(node));
    for (const other of [...grid.joins, ...grid.edgeJoins]) join(gridAt(g), gridAt(indexOf.get(other.grid) as number));
  });
}

function surfaceCarries(surface: NetworkGrid['surfaces'][number]): boolean {
  switch (surface.kind) {
    case 'convection':
      return surface.scale > 0;
    case 'film':
      return surface.coefficientWPerM2K > 0;
    case 'radiation':
      return surface.emissivity * surface.areaFactor > 0;
    case 'air-gap':
    case 'fin-array':
      return true;
  }
}
