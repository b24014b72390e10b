import type { GridEdge, NetworkGrid } from '../../../shared/schemas/network-grid.js';
import { choosePlanes, planeConductances } from './layers.js';
import { gridLines, type Stretch } from './lines.js';

/** Share of the decay length √(k t/h) that a cell may span beside something that heats or cools. */
const decayShare = 1 / 3;
/** Cells across the shortest side of a source. */
const cellsAcross = 5;
/** Cell at an edge over which heat passes, in cells beside a source: what passes there is little and smooth. */
const edgeCells = 4;
/** How much of a cell a rectangle must cover to count as covering it. */
const covers = 0.5;

export interface Rectangle {
  xM: number;
  yM: number;
  sizeM: readonly [number, number];
}

/** A rectangle that another grid covers on this one, and the cell size that the other asks for at its edges. */
export interface Footprint extends Rectangle {
  cell?: number;
  /** The other grid’s lines along both axes, from its own corner. */
  lines?: readonly [Float64Array, Float64Array];
}

/** Where a join’s other grid lies on this one. */
export function joinFootprint(join: NetworkGrid['joins'][number], other: NetworkGrid): Rectangle {
  return { xM: join.xM, yM: join.yM, sizeM: other.sizeM };
}

/** Cell size that a grid needs beside what heats or cools it [m]: a share of √(k t/h). */
export function finestCell({
  layers,
  filmForCellsWPerM2K,
  finestCellM,
}: Pick<NetworkGrid, 'layers' | 'filmForCellsWPerM2K' | 'finestCellM'>): number {
  if (finestCellM !== undefined) return finestCellM;
  const sheet = layers.reduce((sum, { thicknessM, inPlaneWPerMK }) => sum + thicknessM * inPlaneWPerMK, 0);
  return decayShare * Math.sqrt(sheet / filmForCellsWPerM2K);
}

/**
 * The cells of one plate, board or wall: grid lines in the plane, planes through the thickness, areas, and the conductances between
 * cells. Cell (i, j, k) has the number (k ny + j) nx + i; plane 0 is the near surface, the last plane the far one (the same one, where
 * the plate is a single plane).
 */
export class Mesh {
  readonly xs: Float64Array;
  readonly ys: Float64Array;
  readonly nx: number;
  readonly ny: number;
  readonly nz: number;
  readonly cellCount: number;
  /** Pairs of neighbouring cells and the conductance between them [W/K]. */
  readonly first: Int32Array;
  readonly second: Int32Array;
  readonly conductance: Float64Array;
  /** Per plane and column of cells: conductance along the plate k t [W/K]. */
  private readonly sheet: Float64Array;

  /** @param footprints what other grids cover of this one */
  constructor(
    readonly grid: NetworkGrid,
    footprints: readonly Footprint[] = [],
  ) {
    const [lx, ly] = grid.sizeM;
    const sources = grid.patches.filter(({ sizeM }) => sizeM[0] < lx || sizeM[1] < ly);
    const shortest = Math.min(Infinity, ...sources.map(({ sizeM }) => Math.min(...sizeM)));
    const planes = choosePlanes(grid.layers, shortest);
    this.nz = planes.count;
    const own = planeConductances(planes, grid.layers);
    const decay = finestCell(grid);
    const stretches = (axis: 0 | 1): Stretch[] => [
      ...sources.map((patch) => ({
        ...along(patch, axis),
        cell: Math.min(decay, Math.min(...patch.sizeM) / cellsAcross),
        source: true,
      })),
      ...footprints.map((foot) => {
        const stretch = { ...along(foot, axis), cell: Math.min(decay, foot.cell ?? Infinity), source: false };
        return foot.lines ? { ...stretch, lines: foot.lines[axis].map((line) => line + stretch.from) } : stretch;
      }),
      ...grid.zones.map((zone) => ({ ...along(zone, axis), cell: decay, source: false })),
      ...grid.readings.flatMap(({ over }) => (over ? [{ ...along(over, axis), cell: Infinity, source: false }] : [])),
    ];
    const end = (edges: readonly GridEdge[]) =>
      [...grid.edges, ...grid.edgeJoins].some(({ edge }) => edges.includes(edge)) ? edgeCells * decay : Infinity;
    this.xs = gridLines(lx, stretches(0), [end(['x0']), end(['x1'])], grid.refine);
    this.ys = gridLines(ly, stretches(1), [end(['y0']), end(['y1'])], grid.refine);
    this.nx = this.xs.length - 1;
    this.ny = this.ys.length - 1;
    this.cellCount = this.nx * this.ny * this.nz;

    const columns = this.nx * this.ny;
    this.sheet = new Float64Array(this.cellCount);
    const through = new Float64Array(Math.max(this.nz - 1, 0) * columns);
    const zoned = grid.zones.map((zone) => ({ zone, ...planeConductances(planes, zone.layers) }));
    for (let c = 0; c < columns; c++) {
      const x = this.middleX(c % this.nx);
      const y = this.middleY(Math.floor(c / this.nx));
      const zone = zoned.findLast((entry) => within(entry.zone, x, y)) ?? own;
      for (let k = 0; k < this.nz; k++) this.sheet[k * columns + c] = zone.sheet[k] as number;
      for (let k = 0; k + 1 < this.nz; k++) through[k * columns + c] = zone.through[k] as number;
    }

    const links = this.nz * ((this.nx - 1) * this.ny + this.nx * (this.ny - 1)) + through.length;
    this.first = new Int32Array(links);
    this.second = new Int32Array(links);
    this.conductance = new Float64Array(links);
    let l = 0;
    const add = (a: number, b: number, g: number) => {
      this.first[l] = a;
      this.second[l] = b;
      this.conductance[l++] = g;
    };
    for (let k = 0; k < this.nz; k++) {
      for (let j = 0; j < this.ny; j++) {
        for (let i = 0; i < this.nx; i++) {
          const cell = this.cell(i, j, k);
          if (i + 1 < this.nx) {
            const half = this.dx(i) / (this.sheet[cell] as number) + this.dx(i + 1) / (this.sheet[cell + 1] as number);
            add(cell, cell + 1, (2 * this.dy(j)) / half);
          }
          if (j + 1 < this.ny) {
            const beyond = cell + this.nx;
            const half = this.dy(j) / (this.sheet[cell] as number) + this.dy(j + 1) / (this.sheet[beyond] as number);
            add(cell, beyond, (2 * this.dx(i)) / half);
          }
          if (k + 1 < this.nz) add(cell, cell + columns, (through[cell] as number) * this.area(i, j));
        }
      }
    }
  }

  cell(i: number, j: number, k: number): number {
    return (k * this.ny + j) * this.nx + i;
  }

  /** Number of a side’s plane. */
  plane(side: 'near' | 'far'): number {
    return side === 'near' ? 0 : this.nz - 1;
  }

  dx(i: number): number {
    return (this.xs[i + 1] as number) - (this.xs[i] as number);
  }

  dy(j: number): number {
    return (this.ys[j + 1] as number) - (this.ys[j] as number);
  }

  middleX(i: number): number {
    return ((this.xs[i + 1] as number) + (this.xs[i] as number)) / 2;
  }

  middleY(j: number): number {
    return ((this.ys[j + 1] as number) + (this.ys[j] as number)) / 2;
  }

  area(i: number, j: number): number {
    return this.dx(i) * this.dy(j);
  }

  /** Conductance of half a cell from its middle to an edge of the plate, per length of that edge [W/(m K)]. */
  halfCellToEdge(i: number, j: number, k: number, edge: GridEdge): number {
    const across = edge === 'x0' || edge === 'x1' ? this.dx(i) : this.dy(j);
    return (2 * (this.sheet[this.cell(i, j, k)] as number)) / across;
  }

  /** Area of cell (i, j) within a rectangle [m²]. */
  overlap(i: number, j: number, { xM, yM, sizeM }: Rectangle): number {
    const x = Math.min(this.xs[i + 1] as number, xM + sizeM[0]) - Math.max(this.xs[i] as number, xM);
    const y = Math.min(this.ys[j + 1] as number, yM + sizeM[1]) - Math.max(this.ys[j] as number, yM);
    return x > 0 && y > 0 ? x * y : 0;
  }

  /** Area of each column of cells that nothing covers on a side [m²]. */
  freeAreas(side: 'near' | 'far', footprints: readonly Rectangle[]): Float64Array {
    const { grid, nx, ny } = this;
    const frame = side === 'near' ? grid.nearWithinM : undefined;
    const bare: Rectangle = frame
      ? { xM: frame[0], yM: frame[1], sizeM: [frame[2] - frame[0], frame[3] - frame[1]] }
      : { xM: 0, yM: 0, sizeM: grid.sizeM };
    const covering = [...grid.patches.filter((patch) => patch.side === side), ...footprints];
    const free = new Float64Array(nx * ny);
    for (let j = 0; j < ny; j++) {
      for (let i = 0; i < nx; i++) {
        const area = this.area(i, j);
        const covered = covering.some((rectangle) => this.overlap(i, j, rectangle) > covers * area);
        free[j * nx + i] = covered ? 0 : this.overlap(i, j, bare);
      }
    }
    return free;
  }

  /** Cells along an edge: column numbers (i, j) in rising order, with where they begin and end along it. */
  alongEdge(edge: GridEdge): { i: number; j: number; from: number; to: number }[] {
    const { nx, ny, xs, ys } = this;
    if (edge === 'x0' || edge === 'x1') {
      const i = edge === 'x0' ? 0 : nx - 1;
      return Array.from({ length: ny }, (_, j) => ({ i, j, from: ys[j] as number, to: ys[j + 1] as number }));
    }
    const j = edge === 'y0' ? 0 : ny - 1;
    return Array.from({ length: nx }, (_, i) => ({ i, j, from: xs[i] as number, to: xs[i + 1] as number }));
  }
}

function along({ xM, yM, sizeM }: Rectangle, axis: 0 | 1): { from: number; to: number } {
  const from = axis === 0 ? xM : yM;
  return { from, to: from + sizeM[axis] };
}

function within({ xM, yM, sizeM }: Rectangle, x: number, y: number): boolean {
  return x > xM && x < xM + sizeM[0] && y > yM && y < yM + sizeM[1];
}
