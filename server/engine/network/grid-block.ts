import type { NetworkGrid } from '../../../shared/schemas/network-grid.js';
import { finestCell, joinFootprint, Mesh, type Footprint, type Rectangle } from '../grid/mesh.js';

/** A grid in its place in a network: its cells’ numbers begin at `base`. */
export interface PlacedGrid {
  grid: NetworkGrid;
  mesh: Mesh;
  base: number;
  freeNear: Float64Array;
  freeFar: Float64Array;
}

/** Meshes of all grids; each knows what the others cover of it. */
export function placeGrids(grids: readonly NetworkGrid[], firstCell: number): PlacedGrid[] {
  const byId = new Map(grids.map((grid) => [grid.id, grid]));
  // What lies on each grid, by side, and everything that asks for lines.
  const covered = new Map<string, { side: 'near' | 'far'; foot: Footprint; from?: string }[]>(
    grids.map(({ id }) => [id, []]),
  );
  for (const grid of grids) {
    for (const join of grid.joins) {
      const other = byId.get(join.grid);
      if (!other) continue;
      covered.get(grid.id)?.push({ side: join.side, foot: joinFootprint(join, other), from: other.id });
      covered.get(other.id)?.push({
        side: join.gridSide,
        foot: { xM: -join.xM, yM: -join.yM, sizeM: grid.sizeM, cell: finestCell(grid) },
      });
    }
  }
  // What lies on another comes first: the other takes over its lines.
  const meshes = new Map<string, Mesh>();
  const meshOf = (grid: NetworkGrid): Mesh => {
    const known = meshes.get(grid.id);
    if (known) return known;
    const feet = (covered.get(grid.id) ?? []).map(({ foot, from }): Footprint => {
      const other = from === undefined ? undefined : byId.get(from);
      const mesh = other && meshOf(other);
      return mesh ? { ...foot, lines: [mesh.xs, mesh.ys] } : foot;
    });
    const mesh = new Mesh(grid, feet);
    meshes.set(grid.id, mesh);
    return mesh;
  };
  let base = firstCell;
  return grids.map((grid) => {
    const mesh = meshOf(grid);
    const of = (side: 'near' | 'far'): Rectangle[] =>
      (covered.get(grid.id) ?? []).filter((entry) => entry.side === side).map(({ foot }) => foot);
    const placed: PlacedGrid = {
      grid,
      mesh,
      base,
      freeNear: mesh.freeAreas('near', of('near')),
      freeFar: mesh.freeAreas('far', of('far')),
    };
    base += mesh.cellCount;
    return placed;
  });
}

/** Cells of a side with an area each, those without left out. */
export function cellsWithArea(
  { mesh, base }: PlacedGrid,
  side: 'near' | 'far',
  areaOf: (i: number, j: number) => number,
): { cells: Int32Array; areas: Float64Array; sum: number } {
  const cells: number[] = [];
  const areas: number[] = [];
  let sum = 0;
  const plane = mesh.plane(side);
  for (let j = 0; j < mesh.ny; j++) {
    for (let i = 0; i < mesh.nx; i++) {
      const area = areaOf(i, j);
      if (area <= 0) continue;
      cells.push(base + mesh.cell(i, j, plane));
      areas.push(area);
      sum += area;
    }
  }
  return { cells: Int32Array.from(cells), areas: Float64Array.from(areas), sum };
}

/** The free area of a side by cells. */
export function freeCells(placed: PlacedGrid, side: 'near' | 'far') {
  const free = side === 'near' ? placed.freeNear : placed.freeFar;
  return cellsWithArea(placed, side, (i, j) => free[j * placed.mesh.nx + i] as number);
}

/** The cells of a rectangle on a side, or of the whole side, by area. */
export function rectangleCells(placed: PlacedGrid, side: 'near' | 'far', over?: Rectangle) {
  const { mesh } = placed;
  return cellsWithArea(placed, side, (i, j) => (over ? mesh.overlap(i, j, over) : mesh.area(i, j)));
}

export function shares(areas: Float64Array, sum: number): Float64Array {
  return areas.map((area) => area / sum);
}

/** Pairs of cells of two joined grids that lie over each other, with the area they share [m²]. */
export function overlaps(
  a: PlacedGrid,
  side: 'near' | 'far',
  b: PlacedGrid,
  bSide: 'near' | 'far',
  at: { xM: number; yM: number },
): { a: number; b: number; area: number }[] {
  const xs = intervals(a.mesh.xs, b.mesh.xs, at.xM);
  const ys = intervals(a.mesh.ys, b.mesh.ys, at.yM);
  const planeA = a.mesh.plane(side);
  const planeB = b.mesh.plane(bSide);
  return ys.flatMap((y) =>
    xs.map((x) => ({
      a: a.base + a.mesh.cell(x.a, y.a, planeA),
      b: b.base + b.mesh.cell(x.b, y.b, planeB),
      area: x.length * y.length,
    })),
  );
}

/** Which intervals of two sets of lines overlap, and over what length [m]; the second set is shifted. */
export function intervals(a: Float64Array, b: Float64Array, shift: number): { a: number; b: number; length: number }[] {
  const found: { a: number; b: number; length: number }[] = [];
  let i = 0;
  let j = 0;
  while (i + 1 < a.length && j + 1 < b.length) {
    const endA = a[i + 1] as number;
    const endB = (b[j + 1] as number) + shift;
    const from = Math.max(a[i] as number, (b[j] as number) + shift);
    const length = Math.min(endA, endB) - from;
    if (length > 1e-12) found.push({ a: i, b: j, length });
    if (endA < endB) i++;
    else j++;
  }
  return found;
}
