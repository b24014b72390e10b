import fc from 'fast-check';
import type { NetworkDocument, NetworkDocumentInput } from '../../../shared/schemas/network.js';
import { network } from './documents.js';

type Link = NonNullable<NetworkDocumentInput['links']>[number];

const unit = fc.double({ min: 0, max: 1, noNaN: true });

interface LinkSpec {
  kind: number;
  a: number;
  b: number;
  towards: number;
}

const linkSpec: fc.Arbitrary<LinkSpec> = fc.record({
  kind: fc.integer({ min: 0, max: 8 }),
  a: unit,
  b: unit,
  towards: unit,
});

/** A link of some kind with sizes as small housings have them; linear networks take only the first three kinds. */
function makeLink(spec: LinkSpec, from: string, to: string, linear: boolean): Link {
  const { a, b } = spec;
  switch (linear ? spec.kind % 3 : spec.kind) {
    case 0:
      return { kind: 'resistance', from, to, resistanceKPerW: 10 ** (-2 + 5 * a) };
    case 1:
      return {
        kind: 'conduction',
        from,
        to,
        conductivityWPerMK: 0.1 + 200 * a,
        areaM2: 0.001 + 0.02 * b,
        lengthM: 0.002 + 0.05 * a,
      };
    case 2:
      return { kind: 'film', from, to, coefficientWPerM2K: 1 + 30 * a, areaM2: 0.001 + 0.02 * b };
    case 3: {
      const shapes = [
        { shape: 'vertical-plate' },
        { shape: 'plate-facing-up' },
        { shape: 'plate-facing-down' },
        { shape: 'inclined-plate', tiltDeg: 180 * b },
        { shape: 'horizontal-cylinder' },
        { shape: 'vertical-cylinder', diameterM: 0.005 + 0.05 * b },
        { shape: 'sphere' },
      ] as const;
      const flows = ['assisting', 'transverse', 'opposing'] as const;
      return {
        kind: 'convection',
        from,
        to,
        ...(shapes[Math.min(6, Math.floor(7 * a))] ?? shapes[0]),
        areaM2: 0.001 + 0.02 * b,
        lengthM: 0.01 + 0.2 * a,
        // Every second one in moving air, against the natural flow, across it and with it.
        ...(b < 0.5 ? {} : { airSpeedMPerS: 4 * (b - 0.5), flow: flows[Math.floor(30 * a) % 3] ?? 'transverse' }),
      };
    }
    case 4:
      return {
        kind: 'air-gap',
        from,
        to,
        areaM2: 0.001 + 0.02 * b,
        gapM: 0.004 + 0.03 * a,
        heightM: 0.05 + 0.5 * b,
        tiltDeg: 180 * a,
      };
    case 5:
      return {
        kind: 'channel',
        from,
        to,
        areaM2: 0.002 + 0.04 * b,
        spacingM: 0.003 + 0.02 * a,
        heightM: 0.03 + 0.2 * b,
      };
    case 6:
      return {
        kind: 'fin-array',
        from,
        to,
        baseWidthM: 0.05 + 0.1 * a,
        baseHeightM: 0.03 + 0.15 * b,
        finHeightM: 0.01 + 0.04 * a,
        finThicknessM: 0.0005 + 0.001 * b,
        finCount: 4 + Math.floor(10 * b),
        conductivityWPerMK: 1 + 200 * a,
        tiltDeg: 45 * b,
      };
    case 7:
      return b < 0.5
        ? { kind: 'ventilation', from, to, flowM3PerS: 1e-5 + 2e-3 * a }
        : {
            kind: 'ventilation',
            from,
            to,
            inletAreaM2: 1e-5 + 5e-4 * a,
            outletAreaM2: 2e-4 * b,
            heightM: 0.02 + 0.2 * a,
          };
    default:
      return { kind: 'radiation', from, to, areaM2: 0.001 + 0.02 * b, emissivity: 0.05 + 0.95 * a };
  }
}

/**
 * Connected networks of 2 to 14 unknown nodes: each hangs by a link on an earlier node, the first on the room; further links join any
 * two. Heats of nothing, or 10 mW to 10 W.
 */
export function randomNetwork(options: { linear?: boolean } = {}): fc.Arbitrary<NetworkDocument> {
  const linear = options.linear ?? false;
  return fc
    .record({
      heats: fc.array(fc.oneof(fc.constant(0), fc.double({ min: 0.01, max: 10, noNaN: true })), {
        minLength: 2,
        maxLength: 14,
      }),
      tree: fc.array(linkSpec, { minLength: 14, maxLength: 14 }),
      more: fc.array(fc.tuple(linkSpec, unit), { maxLength: 12 }),
      roomC: fc.double({ min: -20, max: 60, noNaN: true }),
    })
    .map(({ heats, tree, more, roomC }) => {
      const name = (i: number) => (i < 0 ? 'room' : `n${String(i)}`);
      const links = heats.map((_, i) => {
        const spec = tree[i] as LinkSpec;
        return makeLink(spec, name(i), name(Math.min(i, Math.floor(spec.towards * (i + 1))) - 1), linear);
      });
      for (const [spec, other] of more) {
        const from = Math.min(heats.length - 1, Math.floor(spec.towards * heats.length));
        const to = Math.floor(other * (heats.length + 1)) - 1;
        if (from !== Math.min(to, heats.length - 1)) {
          links.push(makeLink(spec, name(from), name(Math.min(to, heats.length - 1)), linear));
        }
      }
      return network({
        nodes: [{ id: 'room', fixedC: roomC }, ...heats.map((heatW, i) => ({ id: name(i), heatW }))],
        links: links.map((link, i) => ({ ...link, id: `l${String(i)}` })),
      });
    });
}
