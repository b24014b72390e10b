import type { NetworkDocument, NetworkDocumentInput } from '../../shared/schemas/network.js';
import { networkDocumentSchema } from '../../shared/schemas/network.js';

type Link = NonNullable<NetworkDocumentInput['links']>[number];
type Node = NetworkDocumentInput['nodes'][number];

/**
 * A sealed box of 47 nodes and 144 links: six faces with an inside, a middle and an outside each, round the edges, with natural
 * convection and radiation on both sides, a board of 12 nodes, parts on it, the inside air and a mean radiant node.
 */
export function boxNetwork(): NetworkDocument {
  const nodes: Node[] = [
    { id: 'ambient', fixedC: 35 },
    { id: 'surroundings', fixedC: 33 },
    { id: 'air' },
    { id: 'radiant' },
  ];
  const links: Link[] = [];
  const faces = ['top', 'bottom', 'front', 'back', 'left', 'right'];
  const shapes = (face: string, outside: boolean) =>
    face === 'top' || face === 'bottom'
      ? (face === 'top') === outside
        ? ('plate-facing-up' as const)
        : ('plate-facing-down' as const)
      : ('vertical-plate' as const);
  for (const face of faces) {
    for (const depth of ['in', 'mid', 'out']) nodes.push({ id: `${face}.${depth}` });
    const wall = { kind: 'conduction' as const, conductivityWPerMK: 0.21, areaM2: 0.012, lengthM: 0.0012 };
    links.push({ ...wall, from: `${face}.in`, to: `${face}.mid` }, { ...wall, from: `${face}.mid`, to: `${face}.out` });
    const horizontal = face === 'top' || face === 'bottom';
    const lengthM = horizontal ? 0.028 : 0.09;
    links.push(
      { kind: 'convection', from: `${face}.out`, to: 'ambient', shape: shapes(face, true), areaM2: 0.0122, lengthM },
      { kind: 'convection', from: `${face}.in`, to: 'air', shape: shapes(face, false), areaM2: 0.0118, lengthM },
      { kind: 'radiation', from: `${face}.out`, to: 'surroundings', areaM2: 0.0122, emissivity: 0.92 },
      { kind: 'radiation', from: `${face}.in`, to: 'radiant', areaM2: 0.0142, emissivity: 0.9 },
    );
  }
  const edges = [
    ['top', 'front'],
    ['top', 'back'],
    ['top', 'left'],
    ['top', 'right'],
    ['bottom', 'front'],
    ['bottom', 'back'],
    ['bottom', 'left'],
    ['bottom', 'right'],
    ['front', 'left'],
    ['front', 'right'],
    ['back', 'left'],
    ['back', 'right'],
  ] as const;
  for (const [a, b] of edges) {
    for (const depth of ['in', 'mid', 'out']) {
      links.push({ kind: 'resistance', from: `${a}.${depth}`, to: `${b}.${depth}`, resistanceKPerW: 900 });
    }
  }
  for (let j = 0; j < 3; j++) {
    for (let i = 0; i < 4; i++) {
      const id = `board.${String(i)}.${String(j)}`;
      nodes.push({ id, heatW: 0.05 });
      if (i > 0) {
        links.push({ kind: 'resistance', from: id, to: `board.${String(i - 1)}.${String(j)}`, resistanceKPerW: 22 });
      }
      if (j > 0) {
        links.push({ kind: 'resistance', from: id, to: `board.${String(i)}.${String(j - 1)}`, resistanceKPerW: 22 });
      }
      links.push(
        { kind: 'convection', from: id, to: 'air', shape: 'plate-facing-up', areaM2: 5e-4, lengthM: 0.012 },
        { kind: 'radiation', from: id, to: 'radiant', areaM2: 5e-4, emissivity: 0.9 },
        { kind: 'resistance', from: id, to: 'bottom.in', resistanceKPerW: 380 },
      );
    }
  }
  for (let p = 0; p < 6; p++) {
    nodes.push({ id: `junction.${String(p)}`, heatW: 0.4 });
    links.push({
      kind: 'resistance',
      from: `junction.${String(p)}`,
      to: `board.${String(p % 4)}.${String(p % 3)}`,
      resistanceKPerW: 8,
    });
  }
  for (let p = 0; p < 7; p++) {
    nodes.push({ id: `case.${String(p)}` });
    const junction = `junction.${String(p % 6)}`;
    links.push({ kind: 'resistance', from: `case.${String(p)}`, to: junction, resistanceKPerW: 12 });
    if (p < 4) {
      links.push({
        kind: 'convection',
        from: `case.${String(p)}`,
        to: 'air',
        shape: 'vertical-plate',
        areaM2: 1e-4,
        lengthM: 0.01,
      });
    }
  }
  while (links.length < 144) {
    const p = links.length % 7;
    links.push({ kind: 'radiation', from: `case.${String(p)}`, to: 'radiant', areaM2: 1e-4, emissivity: 0.85 });
  }
  return networkDocumentSchema.parse({ format: 'trimwick-network/1', nodes, links });
}

/**
 * A board as a square grid of its own nodes, each with natural convection and radiation to the room; five parts stand on it.
 *
 * @param side nodes along one side: side² + 5 nodes in all
 */
export function boardNetwork(side: number): NetworkDocument {
  const cell = 0.16 / side;
  const nodes: Node[] = [{ id: 'room', fixedC: 25 }];
  const links: Link[] = [];
  const name = (i: number, j: number) => `c${String(i)}.${String(j)}`;
  for (let j = 0; j < side; j++) {
    for (let i = 0; i < side; i++) {
      nodes.push({ id: name(i, j) });
      const sheet = { kind: 'conduction' as const, conductivityWPerMK: 18, areaM2: cell * 0.0016, lengthM: cell };
      if (i > 0) links.push({ ...sheet, from: name(i - 1, j), to: name(i, j) });
      if (j > 0) links.push({ ...sheet, from: name(i, j - 1), to: name(i, j) });
      links.push(
        {
          kind: 'convection',
          from: name(i, j),
          to: 'room',
          shape: 'vertical-plate',
          areaM2: 2 * cell ** 2,
          lengthM: 0.16,
        },
        { kind: 'radiation', from: name(i, j), to: 'room', areaM2: 2 * cell ** 2, emissivity: 0.9 },
      );
    }
  }
  for (let p = 0; p < 4; p++) {
    nodes.push({ id: `part${String(p)}`, heatW: 1 + p / 2 });
    const at = name(Math.floor((side * (p + 1)) / 6), Math.floor((side * (p + 2)) / 7));
    links.push({ kind: 'resistance', from: `part${String(p)}`, to: at, resistanceKPerW: 3 });
  }
  return networkDocumentSchema.parse({ format: 'trimwick-network/1', nodes, links });
}
