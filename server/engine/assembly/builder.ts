import type { NetworkGrid } from '../../../shared/schemas/network-grid.js';
import type { NetworkDocument, NetworkLimit, NetworkLink, NetworkNode } from '../../../shared/schemas/network.js';
import type { Warning } from '../../../shared/schemas/network-answers.js';
import type { EstimateLimit, nodeRoles } from '../../../shared/schemas/estimate.js';

export type NodeRole = (typeof nodeRoles)[number];

export interface NodeInfo {
  id: string;
  role: NodeRole;
  label: string;
}

/** What the network’s bare limit does not carry. Limits of one `group` are one line for the reader: the worst of them. */
export interface LimitInfo {
  id: string;
  group: string;
  label: string;
  kind: EstimateLimit['kind'];
  unit: EstimateLimit['unit'];
  /** What the rules ask the margin to be, in the limit’s unit (K for temperatures). */
  askedMargin: number;
  part?: string;
  basis: EstimateLimit['basis'];
}

/** Least resistance of a joint [K/W]: what is taken as “no resistance”. */
const leastResistance = 1e-4;

/** Film that cells are sized by: natural convection and radiation together, common practice [W/(m² K)]. */
export const cellFilm = 12;

/** Collects nodes, links and limits with what a reader needs to know of them. */
export class NetworkBuilder {
  /** @param refine divides the cells of all grids */
  constructor(private readonly refine = 1) {}

  readonly nodes: NetworkNode[] = [];
  readonly links: NetworkLink[] = [];
  readonly grids: NetworkGrid[] = [];
  readonly limits: NetworkLimit[] = [];
  readonly nodeInfo: NodeInfo[] = [];
  readonly limitInfo: LimitInfo[] = [];
  readonly warnings: Warning[] = [];
  private readonly readings = new Set<string>();
  private readonly byId = new Map<string, NetworkNode>();

  node(id: string, role: NodeRole, label: string, values: Omit<NetworkNode, 'id'> = {}): void {
    const node = { id, ...values };
    this.nodes.push(node);
    this.byId.set(id, node);
    this.nodeInfo.push({ id, role, label });
  }

  has(id: string): boolean {
    return this.byId.has(id) || this.readings.has(id);
  }

  /** Adds a plate, board or wall that is divided into cells. */
  grid(grid: Pick<NetworkGrid, 'id' | 'sizeM' | 'layers'> & Partial<NetworkGrid>): void {
    this.grids.push({
      zones: [],
      filmForCellsWPerM2K: cellFilm,
      refine: this.refine,
      patches: [],
      free: {},
      surfaces: [],
      joins: [],
      edges: [],
      edgeJoins: [],
      readings: [],
      ...grid,
    });
  }

  gridOf(id: string): NetworkGrid {
    const grid = this.grids.find((candidate) => candidate.id === id);
    if (!grid) throw new RangeError(`No grid ${id}`);
    return grid;
  }

  /** A mean or highest temperature of a grid’s cells, under a name of its own. */
  reading(grid: string, reading: NetworkGrid['readings'][number], role: NodeRole, label: string): void {
    this.gridOf(grid).readings.push(reading);
    this.nodeInfo.push({ id: reading.id, role, label });
    this.readings.add(reading.id);
  }

  addHeat(id: string, heatW: number): void {
    const node = this.byId.get(id);
    if (!node) throw new RangeError(`No node ${id}`);
    node.heatW = (node.heatW ?? 0) + heatW;
  }

  link(link: NetworkLink): void {
    this.links.push(link);
  }

  resistance(id: string, from: string, to: string, resistanceKPerW: number): void {
    this.link({ id, kind: 'resistance', from, to, resistanceKPerW: Math.max(resistanceKPerW, leastResistance) });
  }

  limit(limit: NetworkLimit, info: Omit<LimitInfo, 'id'>): void {
    this.limits.push(limit);
    this.limitInfo.push({ id: limit.id, ...info });
  }

  document(pressurePa: number, supplies: NetworkDocument['supplies']): NetworkDocument {
    return {
      format: 'trimwick-network/1',
      pressurePa,
      nodes: this.nodes,
      links: this.links,
      grids: this.grids,
      supplies,
      limits: this.limits,
    };
  }
}
