import type { NetworkDocument, NetworkLink } from '../../../shared/schemas/network.js';
import type { GridSurface, NetworkGrid } from '../../../shared/schemas/network-grid.js';
import { zeroCelsius } from '../constants.js';
import { CellFilm } from './cell-films.js';
import { GeneralLinks } from './general-links.js';
import { freeCells, intervals, overlaps, placeGrids, rectangleCells, shares, type PlacedGrid } from './grid-block.js';
import { bringsFilm, edgeFlowId, edgeJoinFlowId } from './grid-names.js';
import { LinearLinks, RadiativeLinks, type System } from './link-arrays.js';
import { linkLaw, surfaceLaw } from './link-laws.js';
import { Pairs } from './pairs.js';
import { Patches } from './patches.js';
import { Sources } from './sources.js';
import { SparseLu } from './sparse/lu.js';
import { validateNetwork } from './validate.js';

/** Where a link of the document went. */
type LinkPlace = { kind: 'none' } | { kind: 'linear' | 'radiative' | 'general'; at: number };

/** A named mean or highest temperature of cells. */
interface Reading {
  cells: Int32Array;
  /** Shares of a mean; `null` for the highest. */
  weights: Float64Array | null;
}

/** What a gridded surface’s own link is made of, to report its flow: a film over cells, or a stretch of linear or radiative links. */
type SurfacePlace =
  | { kind: 'film'; film: CellFilm }
  | { kind: 'linear' | 'radiative'; from: number; to: number; areaM2: number; coefficient: number };

/**
 * A network ready to be solved, and solved again with other drives: structure, order and workspace are made once; `evaluate` allocates
 * nothing.
 *
 * Numbering: first the unknown temperatures (nodes, then cells of grids), then the rows that only the matrix knows
 * (multipliers of patches, mean excesses of gridded films), then the fixed temperatures. Temperatures in kelvin.
 */
export class PreparedNetwork implements System {
  /** Unknown temperatures; rows of the matrix; all numbers. */
  readonly unknownCount: number;
  readonly rows: number;
  readonly size: number;
  readonly temperatures: Float64Array;
  /** Heat leaving each node through links less what is put into it [W]; at a fixed node less what flows into it. */
  readonly residual: Float64Array;
  /** Σ |conductance| at each node [W/K], for the rounding floor. */
  readonly stiffness: Float64Array;
  readonly matrix: SparseLu;
  readonly sources: Sources;
  readonly films: CellFilm[] = [];
  readonly grids: readonly PlacedGrid[];
  /** Negative pivots of a stable network: one per patch. */
  readonly expectedNegativePivots: number;
  /** True while the matrix’s factors are those of a state that this network was in: a neighbouring state may use them again. */
  factored = false;
  /** True where no law bends and no device answers to temperature. */
  readonly isLinear: boolean;

  private readonly index = new Map<string, number>();
  private readonly linear = new LinearLinks();
  private readonly radiative = new RadiativeLinks();
  private readonly general = new GeneralLinks();
  private readonly patches = new Patches();
  private readonly places: LinkPlace[];
  private readonly surfaces = new Map<string, SurfacePlace>();
  private readonly readings = new Map<string, Reading>();
  private readonly baseDiagonal: Float64Array;
  private readonly baseOffDiagonal: Float64Array;

  /** @throws EngineError when the document cannot be solved as it stands */
  constructor(readonly document: NetworkDocument) {
    validateNetwork(document);
    const { nodes, links, grids } = document;
    let count = 0;
    for (const node of nodes) if (node.fixedC === undefined) this.index.set(node.id, count++);
    this.grids = placeGrids(grids, count);
    for (const { mesh } of this.grids) count += mesh.cellCount;
    this.unknownCount = count;
    // Multipliers, then the rows of films; pairs ask for the number of rows only when all are known.
    const patchCount = grids.reduce((sum, { patches, free }) => sum + patches.length + Object.keys(free).length, 0);
    const filmCount = grids.reduce((sum, { surfaces }) => sum + surfaces.filter(bringsFilm).length, 0);
    this.rows = count + patchCount + filmCount;
    this.size = this.rows;
    for (const node of nodes) if (node.fixedC !== undefined) this.index.set(node.id, this.size++);
    this.temperatures = new Float64Array(this.size).fill(zeroCelsius + 25);
    for (const node of nodes) {
      if (node.fixedC !== undefined) this.temperatures[this.numberOf(node.id)] = node.fixedC + zeroCelsius;
    }
    this.residual = new Float64Array(this.size);
    this.stiffness = new Float64Array(this.size);

    const pairs = new Pairs(this.rows);
    this.places = links.map((link) => this.placeLink(link, pairs));
    let nextRow = this.unknownCount;
    const late: number[] = [];
    for (const placed of this.grids) nextRow = this.placePatches(placed, nextRow, pairs, late);
    late.push(...this.patches.nodes);
    for (const placed of this.grids) {
      this.placeCells(placed, pairs);
      for (const surface of placed.grid.surfaces) {
        if (bringsFilm(surface)) late.push(nextRow);
        nextRow = this.placeSurface(placed, surface, nextRow, pairs);
      }
    }
    this.placeJoins(pairs);
    this.sources = new Sources(document, (id) => this.numberOf(id), this.size, pairs);

    this.matrix = new SparseLu(this.rows, pairs.toArray(), late, this.size - this.rows);
    pairs.bind(this.matrix);
    for (const part of [this.linear, this.radiative, this.general, this.sources, ...this.films]) part.bind(pairs);
    this.baseDiagonal = new Float64Array(this.matrix.diagonal.length);
    this.baseOffDiagonal = new Float64Array(this.matrix.offDiagonal.length);
    this.linear.addMatrix(this.baseDiagonal, this.baseOffDiagonal);
    this.patches.addMatrix(this.baseOffDiagonal, pairs);
    this.expectedNegativePivots = patchCount;
    this.isLinear =
      this.radiative.length === 0 && this.general.laws.length === 0 && this.films.length === 0 && !this.sources.any;
    for (const placed of this.grids) this.placeReadings(placed);
  }

  /** Number of a node of the document. */
  numberOf(id: string): number {
    return this.index.get(id) as number;
  }

  private placeLink(link: NetworkLink, pairs: Pairs): LinkPlace {
    const law = linkLaw(link, this.document);
    const from = this.numberOf(link.from);
    const to = this.numberOf(link.to);
    if (law.conductance !== undefined) {
      if (law.conductance === 0) return { kind: 'none' };
      return { kind: 'linear', at: this.linear.add(from, to, law.conductance, pairs) };
    }
    if (law.radiatingArea !== undefined) {
      return { kind: 'radiative', at: this.radiative.add(from, to, law.radiatingArea, pairs) };
    }
    return { kind: 'general', at: this.general.add(from, to, law, pairs) };
  }

  private placePatches(placed: PlacedGrid, row: number, pairs: Pairs, late: number[]): number {
    const { grid } = placed;
    let next = row;
    const add = (node: string, found: { cells: Int32Array; areas: Float64Array; sum: number }) => {
      late.push(next);
      this.patches.add(this.numberOf(node), next++, found.cells, shares(found.areas, found.sum), pairs);
    };
    for (const patch of grid.patches) add(patch.node, rectangleCells(placed, patch.side, patch));
    for (const side of ['near', 'far'] as const) {
      const node = grid.free[side];
      if (node === undefined) continue;
      const free = freeCells(placed, side);
      // Nothing of the side is bare: then the node stands for all of it.
      add(node, free.sum > 0 ? free : rectangleCells(placed, side));
    }
    return next;
  }

  private placeCells({ grid, mesh, base }: PlacedGrid, pairs: Pairs): void {
    for (let l = 0; l < mesh.first.length; l++) {
      this.linear.add(
        base + (mesh.first[l] as number),
        base + (mesh.second[l] as number),
        mesh.conductance[l] as number,
        pairs,
      );
    }
    grid.edges.forEach(({ edge, near, far, resistanceKMPerW }, e) => {
      for (const half of ['near', 'far'] as const) {
        const first = this.linear.length;
        const target = this.numberOf(half === 'near' ? near : far);
        for (const { i, j, from, to } of mesh.alongEdge(edge)) {
          for (let k = 0; k < mesh.nz; k++) {
            // Each plane goes to the node of its half; a single plane to both.
            if (mesh.nz > 1 && 2 * k < mesh.nz !== (half === 'near')) continue;
            const own = (mesh.nz === 1 ? 2 : 1) / mesh.halfCellToEdge(i, j, k, edge);
            const beyond = resistanceKMPerW * Math.max(mesh.nz, 2);
            this.linear.add(base + mesh.cell(i, j, k), target, (to - from) / (own + beyond), pairs);
          }
        }
        this.noteLinear(edgeFlowId(grid.id, e, half), first, 0);
      }
    });
  }

  /** Keeps a stretch of linear links under a name, to report their flow together. */
  private noteLinear(id: string, from: number, areaM2: number): void {
    this.surfaces.set(id, { kind: 'linear', from, to: this.linear.length, areaM2, coefficient: 0 });
  }

  private placeSurface(placed: PlacedGrid, surface: GridSurface, row: number, pairs: Pairs): number {
    const { cells, areas, sum } = freeCells(placed, surface.side);
    const to = this.numberOf(surface.to);
    if (bringsFilm(surface)) {
      if (sum > 0) {
        const film = new CellFilm(surface.id, surfaceLaw(surface, this.document), cells, areas, to, row, pairs);
        this.films.push(film);
        this.surfaces.set(surface.id, { kind: 'film', film });
      } else this.linear.add(row, row, 1, pairs);
      return row + 1;
    }
    const links = surface.kind === 'film' ? this.linear : this.radiative;
    const factor = surface.kind === 'film' ? surface.coefficientWPerM2K : surface.emissivity * surface.areaFactor;
    const from = links.length;
    if (factor > 0) cells.forEach((cell, c) => links.add(cell, to, factor * (areas[c] as number), pairs));
    this.surfaces.set(surface.id, {
      kind: surface.kind === 'film' ? 'linear' : 'radiative',
      from,
      to: links.length,
      areaM2: sum,
      coefficient: factor,
    });
    return row;
  }

  private placeJoins(pairs: Pairs): void {
    const byId = new Map(this.grids.map((placed) => [placed.grid.id, placed]));
    for (const placed of this.grids) {
      for (const join of placed.grid.joins) {
        const other = byId.get(join.grid) as PlacedGrid;
        const shared = overlaps(placed, join.side, other, join.gridSide, join);
        const from = this.linear.length;
        for (const { a, b, area } of shared) this.linear.add(a, b, area / join.resistanceKM2PerW, pairs);
        const areaM2 = shared.reduce((sum, { area }) => sum + area, 0);
        this.surfaces.set(join.id, {
          kind: 'linear',
          from,
          to: this.linear.length,
          areaM2,
          coefficient: 1 / join.resistanceKM2PerW,
        });
        if (join.emissivity === 0) continue;
        const first = this.radiative.length;
        for (const { a, b, area } of shared) this.radiative.add(a, b, join.emissivity * area, pairs);
        this.surfaces.set(`${join.id}.radiation`, {
          kind: 'radiative',
          from: first,
          to: this.radiative.length,
          areaM2,
          coefficient: join.emissivity,
        });
      }
      placed.grid.edgeJoins.forEach(({ edge, grid, gridEdge }, e) => {
        const first = this.linear.length;
        this.placeEdgeJoin(placed, edge, byId.get(grid) as PlacedGrid, gridEdge, pairs);
        this.noteLinear(edgeJoinFlowId(placed.grid.id, e), first, 0);
      });
    }
  }

  private placeEdgeJoin(
    a: PlacedGrid,
    edge: NetworkGrid['edgeJoins'][number]['edge'],
    b: PlacedGrid,
    bEdge: NetworkGrid['edgeJoins'][number]['gridEdge'],
    pairs: Pairs,
  ): void {
    const along = (placed: PlacedGrid, which: typeof edge) =>
      which === 'x0' || which === 'x1' ? placed.mesh.ys : placed.mesh.xs;
    const cellsA = a.mesh.alongEdge(edge);
    const cellsB = b.mesh.alongEdge(bEdge);
    const planes = Math.max(a.mesh.nz, b.mesh.nz);
    for (const { a: p, b: q, length } of intervals(along(a, edge), along(b, bEdge), 0)) {
      const cellA = cellsA[p] as (typeof cellsA)[number];
      const cellB = cellsB[q] as (typeof cellsB)[number];
      for (let k = 0; k < planes; k++) {
        const kA = Math.min(k, a.mesh.nz - 1);
        const kB = Math.min(k, b.mesh.nz - 1);
        const half =
          planes / a.mesh.nz / a.mesh.halfCellToEdge(cellA.i, cellA.j, kA, edge) +
          planes / b.mesh.nz / b.mesh.halfCellToEdge(cellB.i, cellB.j, kB, bEdge);
        this.linear.add(
          a.base + a.mesh.cell(cellA.i, cellA.j, kA),
          b.base + b.mesh.cell(cellB.i, cellB.j, kB),
          length / half,
          pairs,
        );
      }
    }
  }

  private placeReadings(placed: PlacedGrid): void {
    for (const { id, side, what, over } of placed.grid.readings) {
      const { cells, areas, sum } = rectangleCells(placed, side, over);
      this.readings.set(id, { cells, weights: what === 'mean' ? shares(areas, sum) : null });
    }
  }

  /** Names of the readings, in order. */
  get readingIds(): IterableIterator<string> {
    return this.readings.keys();
  }

  /** Reads the temperature of a node or a reading [K]. */
  reader(id: string): () => number {
    const reading = this.readings.get(id);
    const { temperatures } = this;
    if (!reading) {
      const n = this.numberOf(id);
      return () => temperatures[n] as number;
    }
    const { cells, weights } = reading;
    return () => {
      let value = weights ? 0 : -Infinity;
      for (let c = 0; c < cells.length; c++) {
        const t = temperatures[cells[c] as number] as number;
        if (weights) value += (weights[c] as number) * t;
        else if (t > value) value = t;
      }
      return value;
    };
  }

  /** Fills residual and the matrix ∂residual/∂T at the present temperatures. */
  evaluate(): void {
    const { residual, stiffness, matrix, temperatures } = this;
    residual.fill(0);
    stiffness.set(this.baseDiagonal);
    matrix.diagonal.set(this.baseDiagonal);
    matrix.offDiagonal.set(this.baseOffDiagonal);
    this.linear.addResidual(this);
    this.radiative.evaluate(this);
    this.general.evaluate(this);
    for (let f = 0; f < this.films.length; f++) (this.films[f] as CellFilm).evaluate(this);
    this.sources.evaluate(temperatures, matrix);
    this.takeOffHeat();
    this.patches.distribute(this);
  }

  /** A plain linear network at about one temperature [K], written into residual and matrix: for the first guess. */
  linearise(kelvin: number): void {
    const { residual, matrix, temperatures } = this;
    residual.fill(0);
    // Only the heats are wanted of the sources: the matrix is made afterwards.
    this.sources.evaluate(temperatures, matrix);
    matrix.diagonal.set(this.baseDiagonal);
    matrix.offDiagonal.set(this.baseOffDiagonal);
    this.linear.addResidual(this);
    this.radiative.linearise(this, kelvin);
    this.general.linearise(this, kelvin);
    for (const film of this.films) film.linearise(this, kelvin);
    this.takeOffHeat();
    this.patches.distribute(this);
  }

  private takeOffHeat(): void {
    const { residual, sources } = this;
    for (let n = 0; n < this.size; n++) residual[n] = (residual[n] as number) - (sources.heat[n] as number);
  }

  /** Sets nodes that stand for means to the means of their cells: to be called after the temperatures have been moved. */
  project(): void {
    this.patches.project(this.temperatures);
  }

  /** Flow of a link of the document at the present temperatures [W], and its film coefficient where it has one. */
  linkFlow(link: number): { flow: number; film?: number } {
    const place = this.places[link] as LinkPlace;
    const { temperatures } = this;
    if (place.kind === 'none') return { flow: 0 };
    const links = place.kind === 'linear' ? this.linear : place.kind === 'radiative' ? this.radiative : this.general;
    const a = temperatures[links.from[place.at] as number] as number;
    const b = temperatures[links.to[place.at] as number] as number;
    if (place.kind === 'linear') return { flow: (this.linear.factor[place.at] as number) * (a - b) };
    if (place.kind === 'radiative') return { flow: this.radiative.flow(place.at, temperatures) };
    const out = { flow: 0, byFrom: 0, byTo: 0, film: 0 };
    const law = this.general.laws[place.at];
    law?.evaluate(a, b, out);
    return law?.hasFilm ? { flow: out.flow, film: out.film } : { flow: out.flow };
  }

  /** The law of a link that has a film coefficient or a range, with its ends. */
  lawOf(link: number) {
    const place = this.places[link] as LinkPlace;
    if (place.kind !== 'general') return undefined;
    const law = this.general.laws[place.at];
    return law && { law, from: this.general.from[place.at] as number, to: this.general.to[place.at] as number };
  }

  /** Flows of gridded surfaces and joins [W], with film coefficients where they have one. */
  surfaceFlows(): { id: string; flow: number; film?: number }[] {
    const { temperatures } = this;
    return [...this.surfaces].map(([id, place]) => {
      if (place.kind === 'film') return { id, flow: place.film.flow(temperatures), film: place.film.film };
      const links = place.kind === 'linear' ? this.linear : this.radiative;
      let flow = 0;
      for (let l = place.from; l < place.to; l++) flow += links.flow(l, temperatures);
      return { id, flow };
    });
  }
}
