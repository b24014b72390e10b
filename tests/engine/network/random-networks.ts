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
  kind: fc.integer({ min: 0, max: 4 }),
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
      const shapes = ['vertical-plate', 'plate-facing-up', 'plate-facing-down'] as const;
      return {
        kind: 'convection',
        from,
        to,
        shape: shapes[Math.min(2, Math.floor(3 * a))] ?? 'vertical-plate',
        areaM2: 0.001 + 0.02 * b,
        lengthM: 0.01 + 0.2 * a,
      };
    }
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
