import type { Estimate } from '../../../shared/schemas/estimate.js';
import type { NetworkLink } from '../../../shared/schemas/network.js';
import { figures } from '../../composables/numbers.js';

/** The heat balance of one node, link by link, with the law that each link follows. */

export interface WorkingRow {
  id: string;
  /** The other end. */
  other: string;
  otherNode: string;
  otherC: number;
  law: string;
  formula: string;
  inputs: { name: string; value: string }[];
  /** Heat that leaves the node through this link [W]; negative: it comes in. */
  outW: number;
}

export interface NodeWorking {
  node: string;
  label: string;
  temperatureC: number;
  secondC: number | undefined;
  /** The node’s temperature is given, not computed. */
  fixed: boolean;
  sources: { words: string; heatW: number }[];
  rows: WorkingRow[];
  /** Where the node is read from cells: the place whose balance is shown in its stead. */
  balanceOf: string | null;
  inW: number;
  outW: number;
}

const kelvin = 273.15;
const shapes = {
  'vertical-plate': 'upright plate',
  'plate-facing-up': 'plate facing up',
  'plate-facing-down': 'plate facing down',
  'inclined-plate': 'inclined plate',
  'horizontal-cylinder': 'horizontal cylinder',
  'vertical-cylinder': 'vertical cylinder',
  sphere: 'sphere',
} as const;

/** Meant thinner than this, a flow is a reading aid of the network and no path of heat [W]. */
const leastFlowW = 5e-5;

function conductivityText(k: number | [number, number][]): string {
  return typeof k === 'number' ? `${figures(k)} W/(m K)` : 'from its table, at the mean temperature';
}

function describe(link: NetworkLink, flowW: number, rise: number): Pick<WorkingRow, 'law' | 'formula' | 'inputs'> {
  const dT = { name: 'ΔT', value: `${figures(rise)} K` };
  switch (link.kind) {
    case 'resistance':
      return {
        law: 'Thermal resistance',
        formula: 'q = ΔT / R',
        inputs: [dT, { name: 'R', value: `${figures(link.resistanceKPerW)} K/W` }],
      };
    case 'conduction':
      return {
        law: 'Conduction',
        formula: 'q = k A ΔT / L',
        inputs: [
          dT,
          { name: 'k', value: conductivityText(link.conductivityWPerMK) },
          { name: 'A', value: `${figures(link.areaM2)} m²` },
          { name: 'L', value: `${figures(link.lengthM * 1000)} mm` },
        ],
      };
    case 'film':
      return {
        law: 'Given film coefficient',
        formula: 'q = h A ΔT',
        inputs: [
          dT,
          { name: 'h', value: `${figures(link.coefficientWPerM2K)} W/(m² K)` },
          { name: 'A', value: `${figures(link.areaM2)} m²` },
        ],
      };
    case 'convection': {
      const h = Math.abs(rise) > 1e-6 && link.areaM2 > 0 ? Math.abs(flowW / (rise * link.areaM2)) : null;
      return {
        law: `${link.airSpeedMPerS ? 'Forced and natural' : 'Natural'} convection, ${shapes[link.shape]}`,
        formula: 'q = h A ΔT, h = Nu k / L',
        inputs: [
          dT,
          ...(h === null ? [] : [{ name: 'h', value: `${figures(h)} W/(m² K)` }]),
          { name: 'A', value: `${figures(link.areaM2)} m²` },
          { name: 'L', value: `${figures(link.lengthM * 1000)} mm` },
          { name: 'correlation', value: link.correlation ?? 'raithby-hollands' },
        ],
      };
    }
    case 'radiation': {
      const inputs = [
        { name: 'A', value: `${figures(link.areaM2)} m²` },
        { name: 'ε', value: figures(link.emissivity) },
      ];
      if (link.emissivityTo === undefined) {
        if (link.viewFactor !== undefined) inputs.push({ name: 'F', value: figures(link.viewFactor) });
        return { law: 'Radiation', formula: 'q = ε σ A F (T₁⁴ − T₂⁴)', inputs };
      }
      inputs.push({ name: 'ε₂', value: figures(link.emissivityTo) });
      return {
        law: 'Radiation between two surfaces',
        formula: 'q = σ (T₁⁴ − T₂⁴) / [(1−ε₁)/(ε₁A₁) + 1/(A₁F₁₂) + (1−ε₂)/(ε₂A₂)]',
        inputs,
      };
    }
    case 'ventilation':
      return {
        law: link.fanCurve || link.flowM3PerS !== undefined ? 'Air moved by a fan' : 'Air exchange by buoyancy',
        formula: link.heightM === undefined ? 'q = ρ c_p V̇ ΔT' : 'q = ρ c_p V̇ ΔT, V̇ = C_d A √(2 g H ΔT / T)',
        inputs: [dT, ...(link.heightM === undefined ? [] : [{ name: 'H', value: `${figures(link.heightM)} m` }])],
      };
    case 'air-gap':
      return {
        law: 'Closed air gap',
        formula: 'q = Nu k A ΔT / gap',
        inputs: [
          dT,
          { name: 'A', value: `${figures(link.areaM2)} m²` },
          { name: 'gap', value: `${figures(link.gapM * 1000)} mm` },
        ],
      };
    case 'fin-array':
      return {
        law: 'Fins',
        formula: 'q = h (η A_fins + A_strips) ΔT',
        inputs: [dT, { name: 'fins', value: String(link.finCount) }],
      };
    case 'channel':
      return {
        law: 'Channel between plates',
        formula: 'q = Nu k A ΔT / s',
        inputs: [dT, { name: 's', value: `${figures(link.spacingM * 1000)} mm` }],
      };
  }
}

function sourcesOf(estimate: Estimate, node: string): NodeWorking['sources'] {
  const found = estimate.network.nodes.find(({ id }) => id === node);
  if (!found) return [];
  const sources: NodeWorking['sources'] = [];
  if (found.heatW !== undefined && found.heatW !== 0) sources.push({ words: 'Heat given', heatW: found.heatW });
  const device = estimate.devices[node];
  if (device && found.source) {
    const words = [
      device.electricalW === undefined ? '' : `${figures(device.electricalW)} W at the terminals`,
      device.lightW === undefined ? '' : `less ${figures(device.lightW)} W of light`,
      device.currentA === undefined ? '' : `${figures(device.currentA)} A`,
      device.voltageV === undefined ? '' : `${figures(device.voltageV)} V`,
    ].filter((part) => part !== '');
    sources.push({ words: words.join(', '), heatW: device.heatW });
  }
  for (const other of estimate.network.nodes) {
    if (other.source?.kind !== 'led') continue;
    const lightW = estimate.devices[other.id]?.lightW ?? 0;
    const share = other.source.light.filter((light) => light.node === node).reduce((sum, { share }) => sum + share, 0);
    // Light that stays inside is heat here; `lightW` is all that the array gives.
    if (share * lightW > 0) sources.push({ words: `Light absorbed, of ${other.id}`, heatW: share * lightW });
  }
  return sources;
}

/** What carries heat between the named places of a plate, board or wall, whose cells are many. */
function describeGrid(estimate: Estimate, link: string): Pick<WorkingRow, 'law' | 'formula' | 'inputs'> {
  const { grids } = estimate.network;
  const surface = grids.flatMap(({ surfaces }) => surfaces).find(({ id }) => id === link);
  if (surface) {
    switch (surface.kind) {
      case 'convection':
        return {
          law: `Convection of its bare side, ${shapes[surface.shape as keyof typeof shapes]}, cell by cell`,
          formula: 'q = Σ h A ΔT, h = Nu k / L at the mean excess',
          inputs: [
            { name: 'L', value: `${figures(surface.lengthM * 1000)} mm` },
            { name: 'correlation', value: surface.correlation ?? 'raithby-hollands' },
          ],
        };
      case 'radiation':
        return {
          law: 'Radiation of its bare side, cell by cell',
          formula: 'q = Σ ε σ A (T₁⁴ − T₂⁴)',
          inputs: [{ name: 'ε A / A', value: figures(surface.emissivity * surface.areaFactor) }],
        };
      case 'film':
        return {
          law: 'Conduction from its side, cell by cell',
          formula: 'q = Σ h A ΔT',
          inputs: [{ name: 'h', value: `${figures(surface.coefficientWPerM2K)} W/(m² K)` }],
        };
      case 'air-gap':
        return {
          law: 'Closed air gap, cell by cell',
          formula: 'q = Σ Nu k A ΔT / gap',
          inputs: [{ name: 'gap', value: `${figures(surface.gapM * 1000)} mm` }],
        };
      case 'fin-array':
        return {
          law: 'Fins',
          formula: 'q = h (η A_fins + A_strips) ΔT',
          inputs: [{ name: 'fins', value: String(surface.finCount) }],
        };
    }
  }
  const join = grids.flatMap(({ joins }) => joins).find(({ id }) => id === link);
  if (join) {
    return {
      law: 'Joint, cell to cell',
      formula: 'q = Σ A ΔT / r',
      inputs: [{ name: 'r', value: `${figures(join.resistanceKM2PerW)} K m²/W` }],
    };
  }
  if (/\.edge(-join)?\.\d+/.test(link)) {
    return { law: 'Conduction round the edge', formula: 'from cell to cell along the edge', inputs: [] };
  }
  return link.endsWith('.spread')
    ? {
        law: 'Spreads into what it stands on',
        formula: 'evenly over its contact; conduction from cell to cell',
        inputs: [],
      }
    : { law: 'Conduction through the wall', formula: 'from cell to cell', inputs: [] };
}

/** Rows of the exchanges that no link of the document carries alone. */
function gridRows(
  estimate: Estimate,
  node: string,
  byId: ReadonlyMap<string, Estimate['nodes'][number]>,
): WorkingRow[] {
  const ofLinks = new Set(estimate.network.links.map((link, i) => link.id ?? `link-${String(i + 1)}`));
  return estimate.exchanges.flatMap((exchange): WorkingRow[] => {
    if (ofLinks.has(exchange.link) || (exchange.from !== node && exchange.to !== node)) return [];
    const outW = exchange.from === node ? exchange.flowW : -exchange.flowW;
    if (Math.abs(outW) < leastFlowW) return [];
    const otherNode = exchange.from === node ? exchange.to : exchange.from;
    const other = byId.get(otherNode);
    return [
      {
        id: `${exchange.link} ${otherNode}`,
        other: other?.label ?? otherNode,
        otherNode,
        otherC: other?.temperatureC ?? NaN,
        outW,
        ...describeGrid(estimate, exchange.link),
      },
    ];
  });
}

/** The place whose balance stands for a reading: the mean of its plate or board, or of its side of a wall. */
function placeOfReading(estimate: Estimate, node: string): string | null {
  const grid = estimate.network.grids.find(({ readings }) => readings.some(({ id }) => id === node));
  const reading = grid?.readings.find(({ id }) => id === node);
  if (!grid || !reading) return null;
  const { near, far } = grid.free;
  const mean = `${grid.id}.mean`;
  const under = `${mean}.${node.slice(node.lastIndexOf('.') + 1)}`;
  const place =
    near === undefined
      ? mean
      : reading.side === 'near' && grid.readings.some(({ id }) => id === under)
        ? under
        : (far ?? near);
  return place === node ? null : place;
}

/** The working of a node’s temperature; `null` when the estimate has no such node. */
export function nodeWorking(estimate: Estimate, node: string): NodeWorking | null {
  const place = placeOfReading(estimate, node);
  const own = balanceAt(estimate, node);
  if (own === null || place === null || own.rows.length > 0) return own;
  const balance = balanceAt(estimate, place);
  if (balance === null) return own;
  const { node: id, label, temperatureC, secondC } = own;
  return { ...balance, node: id, label, temperatureC, secondC, balanceOf: balance.label };
}

function balanceAt(estimate: Estimate, node: string): NodeWorking | null {
  const byId = new Map(estimate.nodes.map((entry) => [entry.id, entry]));
  const self = byId.get(node);
  if (!self) return null;
  const rows = estimate.network.links.flatMap((link, i): WorkingRow[] => {
    if (link.from !== node && link.to !== node) return [];
    const id = link.id ?? `link-${String(i + 1)}`;
    const flow = estimate.flowsW[id] ?? 0;
    const outW = link.from === node ? flow : -flow;
    if (Math.abs(outW) < leastFlowW) return [];
    const otherNode = link.from === node ? link.to : link.from;
    const other = byId.get(otherNode);
    const otherC = other?.temperatureC ?? NaN;
    const described = describe(link, flow, self.temperatureC - otherC);
    const temperatures =
      link.kind === 'radiation'
        ? [
            { name: 'T₁', value: `${(self.temperatureC + kelvin).toFixed(1)} K` },
            { name: 'T₂', value: `${(otherC + kelvin).toFixed(1)} K` },
          ]
        : [];
    return [
      {
        id,
        other: other?.label ?? otherNode,
        otherNode,
        otherC,
        outW,
        ...described,
        inputs: [...described.inputs, ...temperatures],
      },
    ];
  });
  rows.push(...gridRows(estimate, node, byId));
  rows.sort((a, b) => Math.abs(b.outW) - Math.abs(a.outW));
  const sources = sourcesOf(estimate, node);
  const inW =
    sources.reduce((sum, { heatW }) => sum + heatW, 0) - rows.reduce((sum, { outW }) => sum + Math.min(outW, 0), 0);
  return {
    node,
    label: self.label,
    temperatureC: self.temperatureC,
    secondC: self.second,
    fixed: estimate.network.nodes.find(({ id }) => id === node)?.fixedC !== undefined,
    sources,
    rows,
    balanceOf: null,
    inW,
    outW: rows.reduce((sum, { outW }) => sum + Math.max(outW, 0), 0),
  };
}
