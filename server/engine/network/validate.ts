import type { NetworkDocument, NetworkLink, NetworkNode, NetworkSource } from '../../../shared/schemas/network.js';
import { channelCorrelations, findChannelCorrelation } from '../convection/channel.js';
import { correlations, findCorrelation } from '../convection/registry.js';
import { Findings } from './findings.js';
import { checkGrids, joinGrids } from './validate-grids.js';
import { EngineError } from '../errors.js';

/** Name of a link: its id, or `link-3` by position. */
export function linkName(link: NetworkLink, index: number): string {
  return link.id ?? `link-${String(index + 1)}`;
}

/** True when the link can carry heat at all. */
export function carriesHeat(link: NetworkLink): boolean {
  switch (link.kind) {
    case 'resistance':
      return true;
    case 'conduction':
      return link.areaM2 > 0;
    case 'film':
      return link.areaM2 > 0 && link.coefficientWPerM2K > 0;
    case 'convection':
      return link.areaM2 > 0 && link.scale > 0;
    case 'radiation':
      return (
        link.areaM2 > 0 &&
        link.emissivity > 0 &&
        link.viewFactor !== 0 &&
        (link.emissivityTo === undefined || (link.emissivityTo > 0 && link.areaToM2 !== 0))
      );
    case 'air-gap':
    case 'channel':
      return link.areaM2 > 0;
    case 'fin-array':
      return true;
    case 'ventilation': {
      if (link.flowM3PerS !== undefined) return link.flowM3PerS > 0;
      const closed = link.dischargeCoefficient === 0 || link.inletAreaM2 === 0 || link.outletAreaM2 === 0;
      if (link.fanCurve) return !closed && link.fanCurve.some(([flow]) => flow > 0);
      return !closed && (link.heightM ?? 0) > 0;
    }
  }
}

function checkNodes(document: NetworkDocument, findings: Findings): Map<string, number> {
  const ids = new Map<string, number>();
  document.nodes.forEach((node, i) => {
    const path = `/nodes/${String(i)}`;
    if (ids.has(node.id)) {
      findings.add('duplicate-id', {
        path: `${path}/id`,
        message: `Two nodes have the id “${node.id}”`,
        node: node.id,
      });
    }
    ids.set(node.id, i);
    const heated = (node.heatW ?? 0) !== 0 || node.source !== undefined;
    if (node.fixedC !== undefined && heated) {
      findings.add('heat-into-fixed', {
        path: node.source ? `${path}/source` : `${path}/heatW`,
        message: `The temperature of “${node.id}” is fixed: heat cannot be put into it`,
        node: node.id,
      });
    }
  });
  return ids;
}

function checkLink(link: NetworkLink, index: number, nodes: ReadonlyMap<string, number>, findings: Findings): void {
  const path = `/links/${String(index)}`;
  const name = link.id ?? linkName(link, index);
  for (const end of ['from', 'to'] as const) {
    if (!nodes.has(link[end])) {
      findings.add('unknown-reference', {
        path: `${path}/${end}`,
        message: `Link “${name}” names a node “${link[end]}” that is not there`,
        link: name,
      });
    }
  }
  if (link.from === link.to) {
    findings.add('invalid-document', {
      path: `${path}/to`,
      message: `Link “${name}” joins a node to itself`,
      link: name,
    });
  }
  if (link.kind === 'convection' && !findCorrelation(link.shape, link.correlation)) {
    const known = correlations[link.shape].map(({ id }) => id).join(', ');
    findings.add('unknown-reference', {
      path: `${path}/correlation`,
      message: `There is no correlation “${link.correlation ?? ''}” for ${link.shape}; there are ${known}`,
      link: name,
    });
  }
  checkShape(link, path, name, findings);
  if (link.kind === 'radiation' && link.emissivityTo !== undefined) {
    const seen = (link.viewFactor ?? 1) * link.areaM2;
    if (seen > (link.areaToM2 ?? link.areaM2) * (1 + 1e-12)) {
      findings.add('invalid-document', {
        path: `${path}/${link.areaToM2 === undefined ? 'viewFactor' : 'areaToM2'}`,
        message: `Link “${name}”: view factor × area must not exceed the other area (reciprocity)`,
        link: name,
      });
    }
  }
}

/** What a link’s kind or shape needs beyond what every one has. */
function checkShape(link: NetworkLink, path: string, name: string, findings: Findings): void {
  const refuse = (field: string, message: string) => {
    findings.add('invalid-document', { path: `${path}/${field}`, message: `Link “${name}”: ${message}`, link: name });
  };
  switch (link.kind) {
    case 'convection':
      if (link.shape === 'inclined-plate' && link.tiltDeg === undefined) {
        refuse('tiltDeg', 'an inclined plate needs its tilt');
      }
      if (link.shape === 'vertical-cylinder' && link.diameterM === undefined) {
        refuse('diameterM', 'a vertical cylinder needs its diameter');
      }
      return;
    case 'channel':
      if (!findChannelCorrelation(link.correlation)) {
        const known = channelCorrelations.map(({ id }) => id).join(', ');
        findings.add('unknown-reference', {
          path: `${path}/correlation`,
          message: `There is no correlation “${link.correlation ?? ''}” for a channel; there are ${known}`,
          link: name,
        });
      }
      return;
    case 'fin-array':
      if (link.finCount * link.finThicknessM >= link.baseWidthM) {
        refuse('finCount', 'so many fins of this thickness leave no gap between them');
      }
      if (link.tiltDeg > steepestChannel) {
        refuse('tiltDeg', 'there is no published law for fins that lean more than 45°');
      }
      return;
    case 'ventilation':
      checkVentilation(link, refuse);
      return;
    default:
  }
}

/** Lean of fins beyond which no published law is at hand [°]. */
const steepestChannel = 45;

function checkVentilation(
  link: Extract<NetworkLink, { kind: 'ventilation' }>,
  refuse: (field: string, message: string) => void,
): void {
  if (link.flowM3PerS !== undefined) {
    if (link.fanCurve) refuse('fanCurve', 'it has a given flow already');
    return;
  }
  if (link.fanCurve) {
    if (link.inletAreaM2 === undefined && link.outletAreaM2 === undefined) {
      refuse('inletAreaM2', 'a fan needs the area of the openings before it');
    }
    const falling = link.fanCurve.every(([flow, pressure], i) => {
      const before = link.fanCurve?.[i - 1];
      return !before || (flow > before[0] && pressure <= before[1]);
    });
    if (!falling) refuse('fanCurve', 'a fan curve rises in flow and falls in pressure from point to point');
    return;
  }
  for (const field of ['inletAreaM2', 'outletAreaM2', 'heightM'] as const) {
    if (link[field] === undefined) {
      refuse(field, 'without a given flow it needs both openings and the height between them');
    }
  }
}

function checkSource(
  source: NetworkSource,
  node: string,
  path: string,
  known: { nodes: ReadonlyMap<string, number>; supplies: ReadonlySet<string>; fixed: ReadonlySet<string> },
  findings: Findings,
): void {
  if (source.supply !== undefined && !known.supplies.has(source.supply)) {
    findings.add('unknown-reference', {
      path: `${path}/supply`,
      message: `There is no supply “${source.supply}”`,
      node,
    });
  }
  if (source.kind === 'converter') {
    if (source.outputW === undefined && (source.outputV === undefined || source.supply === undefined)) {
      findings.add('invalid-document', {
        path: `${path}/outputW`,
        message: `The converter at “${node}” needs its output power, or an output voltage and a supply`,
        node,
      });
    }
    return;
  }
  if (source.supply === undefined && source.currentA === undefined) {
    findings.add('invalid-document', {
      path: `${path}/currentA`,
      message: `The source at “${node}” needs a current or a supply`,
      node,
    });
  }
  if (source.kind !== 'led') return;
  source.light.forEach((light, i) => {
    if (known.fixed.has(light.node)) {
      const message = `The light of “${node}” falls on “${light.node}”, whose temperature is fixed: let it leave instead`;
      findings.add('heat-into-fixed', { path: `${path}/light/${String(i)}/node`, message, node });
    }
    if (known.nodes.has(light.node)) return;
    const message = `The light of “${node}” falls on a node “${light.node}” that is not there`;
    findings.add('unknown-reference', { path: `${path}/light/${String(i)}/node`, message, node });
  });
  const shares = source.light.reduce((sum, light) => sum + light.share, 0);
  if (shares > 1 + 1e-9) {
    findings.add('invalid-document', {
      path: `${path}/light`,
      message: `The shares of the light of “${node}” exceed 1`,
      node,
    });
  }
}

function checkLimits(
  document: NetworkDocument,
  known: { nodes: ReadonlyMap<string, number>; readings: ReadonlySet<string>; supplies: ReadonlySet<string> },
  findings: Findings,
): void {
  const ids = new Set<string>();
  document.limits.forEach((limit, i) => {
    const path = `/limits/${String(i)}`;
    if (ids.has(limit.id)) {
      findings.add('duplicate-id', { path: `${path}/id`, message: `Two limits have the id “${limit.id}”` });
    }
    ids.add(limit.id);
    if ('supply' in limit) {
      if (known.supplies.has(limit.supply)) return;
      findings.add('unknown-reference', { path: `${path}/supply`, message: `There is no supply “${limit.supply}”` });
      return;
    }
    const reference = 'maxW' in limit ? limit.derating?.referenceNode : undefined;
    for (const [key, id] of [
      ['node', limit.node],
      ['derating/referenceNode', reference],
    ] as const) {
      if (id === undefined || known.nodes.has(id) || known.readings.has(id)) continue;
      findings.add('unknown-reference', { path: `${path}/${key}`, message: `There is no node “${id}”`, node: id });
    }
    if ('maxA' in limit || 'maxW' in limit) {
      const node = document.nodes.find(({ id }) => id === limit.node);
      if (node && !node.source && !('maxW' in limit && node.heatW !== undefined)) {
        const message = `There is no device at “${limit.node}” whose rating this could be`;
        findings.add('invalid-document', { path: `${path}/node`, message, node: limit.node });
      }
    }
  });
}

function checkLinkNames(links: readonly NetworkLink[], findings: Findings): void {
  const named = links.filter(({ id }) => id !== undefined).length;
  // Names by position differ from each other.
  if (named === 0) return;
  const names = new Set<string>();
  links.forEach((link, i) => {
    const name = linkName(link, i);
    if (names.has(name)) {
      const message = `Two links have the id “${name}”`;
      findings.add('duplicate-id', { path: `/links/${String(i)}/id`, message, link: name });
    }
    names.add(name);
  });
}

/** Positions of the nodes, then of the grids, from which no chain of links that carry heat leads to a fixed temperature. */
function withoutPath(document: NetworkDocument, nodes: ReadonlyMap<string, number>): number[] {
  const count = document.nodes.length;
  const parent = Array.from({ length: count + document.grids.length }, (_, i) => i);
  const root = (i: number): number => {
    let at = i;
    while (parent[at] !== at) {
      const up = parent[parent[at] as number] as number;
      parent[at] = up;
      at = up;
    }
    return at;
  };
  const join = (a: number, b: number) => {
    parent[root(a)] = root(b);
  };
  const at = (id: string) => nodes.get(id) as number;
  for (const link of document.links) if (carriesHeat(link)) join(at(link.from), at(link.to));
  joinGrids(document.grids, at, (grid) => count + grid, join);
  const reached = new Uint8Array(parent.length);
  document.nodes.forEach(({ fixedC }, i) => {
    if (fixedC !== undefined) reached[root(i)] = 1;
  });
  return parent.flatMap((_, i) => (reached[root(i)] === 1 ? [] : [i]));
}

/**
 * Checks what the schema cannot: references, repeats, reciprocity, paths to a fixed temperature.
 *
 * @throws EngineError with every finding, each naming its node or link
 */
export function validateNetwork(document: NetworkDocument): void {
  const findings = new Findings();
  const nodes = checkNodes(document, findings);
  const supplies = new Set<string>();
  document.supplies.forEach(({ id }, i) => {
    if (supplies.has(id)) {
      findings.add('duplicate-id', { path: `/supplies/${String(i)}/id`, message: `Two supplies have the id “${id}”` });
    }
    supplies.add(id);
  });
  checkLinkNames(document.links, findings);
  document.links.forEach((link, i) => {
    checkLink(link, i, nodes, findings);
  });
  const readings = checkGrids(document, nodes, findings);
  const fixed = new Set(document.nodes.filter(({ fixedC }) => fixedC !== undefined).map(({ id }) => id));
  document.nodes.forEach((node, i) => {
    if (node.source)
      checkSource(node.source, node.id, `/nodes/${String(i)}/source`, { nodes, supplies, fixed }, findings);
  });
  checkLimits(document, { nodes, readings, supplies }, findings);
  if (findings.list.length === 0) {
    for (const i of withoutPath(document, nodes)) {
      const grid = document.grids[i - document.nodes.length];
      if (grid) {
        const message = `From the grid “${grid.id}” no heat can flow to a fixed temperature`;
        findings.add('no-path-to-fixed', { path: `/grids/${String(i - document.nodes.length)}`, message });
        continue;
      }
      const { id } = document.nodes[i] as NetworkNode;
      findings.add('no-path-to-fixed', {
        path: `/nodes/${String(i)}`,
        message: `From “${id}” no heat can flow to a fixed temperature`,
        node: id,
      });
    }
  }
  const first = findings.list[0];
  if (first)
    throw new EngineError(
      first.code,
      first.error.message,
      findings.list.map(({ error }) => error),
    );
}
