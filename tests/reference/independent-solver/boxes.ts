import type { NetworkDocumentInput } from '../../../shared/schemas/network.js';

type Link = NonNullable<NetworkDocumentInput['links']>[number];
type Content = Omit<NetworkDocumentInput, 'format'>;

/** Inside and outside of one face: convection and radiation on both sides of a wall. */
function face(
  name: string,
  shapes: { inner: string; outer: string },
  areaM2: number,
  lengthM: number,
  k: number,
): Link[] {
  type Shape = 'vertical-plate';
  const [inner, outer] = [`${name}.inner`, `${name}.outer`];
  return [
    { id: `${name}-in`, kind: 'convection', from: inner, to: 'air', shape: shapes.inner as Shape, areaM2, lengthM },
    { id: `${name}-wall`, kind: 'conduction', from: inner, to: outer, conductivityWPerMK: k, areaM2, lengthM: 0.003 },
    { id: `${name}-out`, kind: 'convection', from: outer, to: 'room', shape: shapes.outer as Shape, areaM2, lengthM },
    { id: `${name}-shines`, kind: 'radiation', from: outer, to: 'room', areaM2, emissivity: 0.9 },
    {
      id: `${name}-sees`,
      kind: 'radiation',
      from: 'part',
      to: inner,
      areaM2: 0.002,
      emissivity: 0.85,
      emissivityTo: 0.9,
      areaToM2: areaM2,
    },
  ];
}

/** A closed box of 160 × 100 × 60 mm with one part in its air; the bottom may stand on an adiabatic table. */
function box(options: { k: number; heatW: number; roomC: number; onTable?: boolean; pressurePa?: number }): Content {
  const faces: Link[] = [
    ...face('front', { inner: 'vertical-plate', outer: 'vertical-plate' }, 2 * (0.16 + 0.1) * 0.06, 0.06, options.k),
    // The inside of the lid is a plate that looks down at warm air, the inside of the bottom one that looks up.
    ...face('lid', { inner: 'plate-facing-down', outer: 'plate-facing-up' }, 0.016, 0.016 / 0.52, options.k),
    ...face('bottom', { inner: 'plate-facing-up', outer: 'plate-facing-down' }, 0.016, 0.016 / 0.52, options.k),
  ];
  const links: Link[] = faces.filter(
    ({ id }) => !(options.onTable === true && (id === 'bottom-out' || id === 'bottom-shines')),
  );
  const sides = ['front', 'lid', 'bottom'].flatMap((name) => [{ id: `${name}.inner` }, { id: `${name}.outer` }]);
  return {
    pressurePa: options.pressurePa ?? 101325,
    nodes: [{ id: 'room', fixedC: options.roomC }, { id: 'air' }, { id: 'part', heatW: options.heatW }, ...sides],
    links: [
      ...links,
      {
        id: 'part-up',
        kind: 'convection',
        from: 'part',
        to: 'air',
        shape: 'plate-facing-up',
        areaM2: 0.003,
        lengthM: 0.0125,
      },
      {
        id: 'part-side',
        kind: 'convection',
        from: 'part',
        to: 'air',
        shape: 'vertical-plate',
        areaM2: 0.002,
        lengthM: 0.02,
      },
      { id: 'part-foot', kind: 'resistance', from: 'part', to: 'bottom.inner', resistanceKPerW: 8 },
    ],
  };
}

/** Boxes as people build them, each with its name. */
export const boxes: Record<string, Content> = {
  'a printed box on a table, 6 W': box({ k: 0.2, heatW: 6, roomC: 25, onTable: true }),
  'the same in aluminium, free on all sides': box({ k: 180, heatW: 6, roomC: 25 }),
  'a printed box at 3 000 m in a hot room, 3 W': box({ k: 0.2, heatW: 3, roomC: 45, pressurePa: 70109 }),
  'an aluminium box that a cooler in it draws 2 W from': box({ k: 180, heatW: -2, roomC: 30 }),
};
