import {
  faceNames,
  type AssemblyDocument,
  type Carrier,
  type FaceName,
  type Housing,
  type Part,
} from '../../../shared/schemas/assembly.js';
import type { GridLayer } from '../../../shared/schemas/network-grid.js';
import { boardLayerConductivities, withVias } from '../conduction/board.js';
import { stackSpecificResistance } from '../conduction/contact.js';
import type { FieldError } from '../errors.js';
import type { Assumptions } from './assumptions.js';
import { defaults } from './defaults.js';
import { faceSize } from './geometry.js';
import { lookUp } from '../tables.js';
import { contentOf } from './inline-values.js';
import { bankSize, place, type Item, type Rectangle } from './placing.js';
import { isPolymer, resolveEmissivity, wallReferenceC } from './resolve-housing.js';
import type { Faces, ResolvedCarrier, ResolvedLead, ResolvedPart } from './resolved.js';

type Stack = Part['mount']['stack'];

/** Specific resistance of a joint [K m²/W]; not known: a dry joint. */
function resolveJoint(stack: Stack, path: string, onPrint: boolean, assumptions: Assumptions): number {
  if (stack === null) {
    return onPrint
      ? assumptions.fill<number>(null, path, 'jointPrinted', defaults.jointPrinted)
      : assumptions.fill<number>(null, path, 'jointMetal', defaults.jointMetal);
  }
  return stackSpecificResistance(
    stack.map((layer, i) => {
      const material = contentOf(layer.material, `${path}/${String(i)}/material`);
      return {
        thickness: assumptions.fill<number>(
          layer.thicknessM,
          `${path}/${String(i)}/thicknessM`,
          'bondLineM',
          defaults.bondLineM,
        ),
        conductivity: lookUp(material.conductivityWPerMK.value, wallReferenceC),
        specificResistance: material.contactResistanceKM2PerW?.value ?? 0,
        contactShare: layer.contactShare,
      };
    }),
  );
}

/** A carrier’s layers from the side of its parts, with what differs in its zones. */
function boardLayers(
  carrier: Extract<Carrier, { kind: 'board' }>,
  path: string,
): { layers: GridLayer[]; zones: ResolvedCarrier['zones']; errors: FieldError[] } {
  const materials = carrier.layers.map((layer, j) => {
    const material = contentOf(layer.material, `${path}/layers/${String(j)}/material`);
    const along = lookUp(material.conductivityWPerMK.value, wallReferenceC);
    const through = material.conductivityThroughLayersWPerMK
      ? lookUp(material.conductivityThroughLayersWPerMK.value, wallReferenceC)
      : along;
    return { along, through, thickness: layer.thicknessM, coverage: layer.coverage };
  });
  const layers = boardLayerConductivities(materials);
  const errors: FieldError[] = [];
  const zones = carrier.zones.map((zone, z) => {
    const zonePath = `${path}/zones/${String(z)}`;
    if (zone.xM + zone.sizeM[0] > carrier.sizeM[0] + 1e-6 || zone.yM + zone.sizeM[1] > carrier.sizeM[1] + 1e-6) {
      errors.push({ path: `${zonePath}/xM`, message: 'The zone hangs over the edge of the board' });
    }
    const covered = materials.map((layer, j) => ({ ...layer, coverage: zone.coverages?.[j] ?? layer.coverage }));
    const plain = boardLayerConductivities(covered);
    return {
      xM: zone.xM,
      yM: zone.yM,
      sizeM: zone.sizeM,
      layers: zone.vias ? withVias(plain, zone.vias, zone.sizeM[0] * zone.sizeM[1]) : plain,
    };
  });
  return { layers, zones, errors };
}

/** Everything of a carrier but its place. */
function resolveCarrier(
  carrier: Carrier,
  path: string,
  faces: Faces | null,
  assumptions: Assumptions,
): { resolved: Omit<ResolvedCarrier, 'at'>; errors: FieldError[] } {
  const onPrint = carrier.on !== null && faces !== null && isPolymer(faces[carrier.on.face].material);
  const common = {
    id: carrier.id,
    path,
    face: faces === null ? null : (carrier.on?.face ?? null),
    facing: carrier.facing ?? ('up' as const),
  };
  if (carrier.kind !== 'board') {
    const material = contentOf(carrier.material, `${path}/material`);
    const k = lookUp(material.conductivityWPerMK.value, wallReferenceC);
    return {
      resolved: {
        ...common,
        kind: carrier.kind,
        thicknessM: carrier.thicknessM,
        layers: [
          {
            thicknessM: carrier.thicknessM,
            inPlaneWPerMK: k,
            throughWPerMK: k,
            heatCapacityJPerM3K: material.densityKgPerM3.value * material.specificHeatJPerKgK.value,
          },
        ],
        zones: [],
        fins: carrier.kind === 'fins' ? { ...carrier.fins, conductivity: k } : null,
        polymer: isPolymer(material),
        emissivity: resolveEmissivity(carrier.finish, material, `${path}/finish`, 'of plates', assumptions),
        jointKM2PerW: carrier.on ? resolveJoint(carrier.on.stack, `${path}/on/stack`, onPrint, assumptions) : 0,
        standOffM: 0,
      },
      errors: carrier.kind === 'fins' ? finErrors(carrier, path) : [],
    };
  }
  const { layers, zones, errors } = boardLayers(carrier, path);
  const heat = (j: number) => {
    const material = contentOf((carrier.layers[j] as (typeof carrier.layers)[number]).material, path);
    return material.densityKgPerM3.value * material.specificHeatJPerKgK.value;
  };
  return {
    resolved: {
      ...common,
      kind: 'board',
      thicknessM: layers.reduce((sum, layer) => sum + layer.thicknessM, 0),
      layers: layers.map((layer, j) => ({
        ...layer,
        heatCapacityJPerM3K: heat(j) * (carrier.layers[j] as (typeof carrier.layers)[number]).coverage,
      })),
      zones,
      fins: null,
      polymer: false,
      emissivity:
        carrier.finish === null
          ? assumptions.fill<number>(null, `${path}/finish`, 'emissivity boards', {
              ...defaults.emissivityOther,
              label: 'Emissivity of boards',
            })
          : contentOf(carrier.finish, `${path}/finish`).emissivity.value,
      jointKM2PerW: 0,
      standOffM:
        common.face === null
          ? 0
          : assumptions.fill<number>(carrier.standOffM, `${path}/standOffM`, 'standOffM', defaults.standOffM),
    },
    errors,
  };
}

function finErrors({ fins, sizeM }: Extract<Carrier, { kind: 'fins' }>, path: string): FieldError[] {
  const width = fins.along === 'y' ? sizeM[0] : sizeM[1];
  if (fins.count * fins.thicknessM < width) return [];
  return [{ path: `${path}/fins/count`, message: 'So many fins of this thickness leave no gap between them' }];
}

/** The inside of a face as it may be used, in the face’s own plane. */
export function insideOf(face: FaceName, housing: Housing, faces: Faces): Rectangle {
  const wall = (name: FaceName) => faces[name].wallM;
  const [low, high]: [[FaceName, FaceName], [FaceName, FaceName]] = [
    [face === 'left' || face === 'right' ? 'front' : 'left', face === 'left' || face === 'right' ? 'back' : 'right'],
    [face === 'top' || face === 'bottom' ? 'front' : 'bottom', face === 'top' || face === 'bottom' ? 'back' : 'top'],
  ];
  const [u, v] = faceSize(face, housing.outerM);
  return {
    xM: wall(low[0]),
    yM: wall(high[0]),
    sizeM: [u - wall(low[0]) - wall(low[1]), v - wall(high[0]) - wall(high[1])],
  };
}

export function resolveCarriers(
  document: AssemblyDocument,
  faces: Faces | null,
  assumptions: Assumptions,
): { carriers: ResolvedCarrier[]; errors: FieldError[] } {
  const errors: FieldError[] = [];
  const bare = document.carriers.map((carrier, i) => {
    const path = `/carriers/${String(i)}`;
    const { housing } = document;
    if (housing === null && carrier.on !== null) {
      errors.push({ path: `${path}/on/face`, message: 'An open assembly has no faces: it stands in the room' });
    }
    if (housing !== null && carrier.on === null) {
      errors.push({ path: `${path}/on`, message: 'Say which face it lies on' });
    }
    const { resolved, errors: own } = resolveCarrier(carrier, path, faces, assumptions);
    errors.push(...own);
    return resolved;
  });
  const places = new Map<string, Rectangle>();
  const { housing } = document;
  if (housing && faces) {
    for (const face of faceNames) {
      for (const outside of [false, true]) {
        const [u, v] = faceSize(face, housing.outerM);
        const room = outside ? { xM: 0, yM: 0, sizeM: [u, v] as const } : insideOf(face, housing, faces);
        const here = bare.filter((carrier) => carrier.face === face && (carrier.kind === 'fins') === outside);
        const items = here.map((carrier): Item => {
          const given = document.carriers.find(({ id }) => id === carrier.id);
          return {
            path: `${carrier.path}/on`,
            sizePath: `${carrier.path}/sizeM`,
            label: `“${carrier.id}”`,
            sizeM: given?.sizeM ?? [0, 0],
            xM: given?.on?.xM ?? null,
            yM: given?.on?.yM ?? null,
          };
        });
        // Boards on stand-offs may stand over plates.
        for (const kind of ['plate', 'board', 'fins'] as const) {
          const chosen = items.filter((_, n) => here[n]?.kind === kind);
          const { rectangles, errors: found } = place(chosen, room, `the ${face} face`);
          errors.push(...found);
          here
            .filter((carrier) => carrier.kind === kind)
            .forEach((carrier, n) => {
              places.set(carrier.id, rectangles[n] as Rectangle);
            });
        }
      }
    }
  }
  const carriers = bare.map((carrier, i) => ({
    ...carrier,
    at: places.get(carrier.id) ?? {
      xM: 0,
      yM: 0,
      sizeM: (document.carriers[i] as Carrier).sizeM,
    },
  }));
  return { carriers, errors };
}

function readMount(on: string, carriers: readonly ResolvedCarrier[], housed: boolean): ResolvedPart['on'] | null {
  const face = housed ? faceNames.find((name) => on === `face.${name}`) : undefined;
  if (face) return { kind: 'face', face };
  return carriers.some((carrier) => carrier.id === on) ? { kind: 'carrier', carrier: on } : null;
}

function checkElectrical(part: Part, kind: string, path: string, supplies: ReadonlySet<string>): FieldError[] {
  const errors: FieldError[] = [];
  if (part.supply !== null && !supplies.has(part.supply)) {
    errors.push({ path: `${path}/supply`, message: `There is no supply “${part.supply}”` });
  }
  if (kind !== 'heat' && part.supply === null) {
    errors.push({ path: `${path}/supply`, message: 'Choose the supply that feeds this part' });
  }
  if (kind !== 'resistor' && part.count > 1) {
    errors.push({ path: `${path}/count`, message: 'Only resistors make a bank: add further parts one by one' });
  }
  return errors;
}

/** Lays the parts on what they stand on. */
function placeParts(
  document: AssemblyDocument,
  faces: Faces | null,
  carriers: readonly ResolvedCarrier[],
  parts: ResolvedPart[],
  assumptions: Assumptions,
): FieldError[] {
  const errors: FieldError[] = [];
  const hosts = [
    ...carriers.map(({ id, at }) => ({
      is: (part: ResolvedPart) => part.on.kind === 'carrier' && part.on.carrier === id,
      room: { xM: 0, yM: 0, sizeM: at.sizeM },
      taken: [] as Rectangle[],
      where: `“${id}”`,
    })),
    ...faceNames.flatMap((face) =>
      document.housing && faces
        ? [
            {
              is: (part: ResolvedPart) => part.on.kind === 'face' && part.on.face === face,
              room: insideOf(face, document.housing, faces),
              taken: carriers
                .filter((carrier) => carrier.face === face && carrier.kind === 'plate')
                .map(({ at }) => at),
              where: `the ${face} face`,
            },
          ]
        : [],
    ),
  ];
  for (const { is, room, taken, where } of hosts) {
    const here = parts.filter(is);
    const items = here.map((part): Item => {
      const given = document.parts.find(({ id }) => id === part.id)?.mount;
      const sizeM = bankSize(part.type.footprintM.value, part.count, room.sizeM);
      const known = sizeM && given && given.xM != null && given.yM != null;
      if (!known && here.length + taken.length > 1) {
        assumptions.note(`${part.path}/mount/xM`, 'positions', defaults.positions);
      }
      return {
        path: `${part.path}/mount`,
        sizePath: `${part.path}/mount/on`,
        label: part.label,
        sizeM: sizeM ?? part.type.footprintM.value,
        xM: known ? (given.xM as number) - sizeM[0] / 2 : null,
        yM: known ? (given.yM as number) - sizeM[1] / 2 : null,
      };
    });
    const { rectangles, errors: found } = place(items, room, where, taken);
    errors.push(...found);
    here.forEach((part, n) => {
      part.at = rectangles[n] as Rectangle;
    });
  }
  return errors;
}

/** Leads: each at a part, with a supply or a current of its own. */
export function resolveLeads(
  document: AssemblyDocument,
  parts: readonly ResolvedPart[],
): { leads: ResolvedLead[]; errors: FieldError[] } {
  const errors: FieldError[] = [];
  const leads = document.leads.map((lead, i) => {
    const path = `/leads/${String(i)}`;
    if (!parts.some(({ id }) => id === lead.part)) {
      errors.push({ path: `${path}/part`, message: `There is no part “${lead.part}”` });
    }
    if (lead.supply !== null && !document.supplies.some(({ id }) => id === lead.supply)) {
      errors.push({ path: `${path}/supply`, message: `There is no supply “${lead.supply}”` });
    }
    if (lead.supply === null && lead.currentA === null) {
      errors.push({ path: `${path}/currentA`, message: 'Say which current it carries, or choose its supply' });
    }
    return { ...lead, path, label: lead.name ?? `Lead ${lead.id}` };
  });
  return { leads, errors };
}

export function resolveParts(
  document: AssemblyDocument,
  faces: Faces | null,
  carriers: readonly ResolvedCarrier[],
  assumptions: Assumptions,
): { parts: ResolvedPart[]; errors: FieldError[] } {
  const errors: FieldError[] = [];
  const supplies = new Set(document.supplies.map((supply) => supply.id));
  const parts: ResolvedPart[] = [];
  document.parts.forEach((part, i) => {
    const path = `/parts/${String(i)}`;
    const type = contentOf(part.type, `${path}/type`);
    const on = readMount(part.mount.on, carriers, faces !== null);
    errors.push(...checkElectrical(part, type.electrical.kind, path, supplies));
    if (on === null) {
      errors.push({
        path: `${path}/mount/on`,
        message: `There is no carrier or face “${part.mount.on}” to stand on`,
      });
      return;
    }
    const polymerBelow =
      on.kind === 'face'
        ? faces !== null && isPolymer(faces[on.face].material)
        : (carriers.find((carrier) => carrier.id === on.carrier)?.polymer ?? false);
    const isLed = type.electrical.kind === 'led';
    parts.push({
      id: part.id,
      path,
      label: part.name ?? part.id,
      type,
      on,
      at: { xM: 0, yM: 0, sizeM: type.footprintM.value },
      jointKM2PerW: resolveJoint(part.mount.stack, `${path}/mount/stack`, polymerBelow, assumptions),
      supply: part.supply,
      count: part.count,
      arrangement: part.arrangement,
      heatW:
        type.electrical.kind === 'heat'
          ? assumptions.fill<number>(part.heatW, `${path}/heatW`, `heat ${part.id}`, {
              ...defaults.heatW,
              label: `${part.name ?? part.id}, heat`,
            })
          : 0,
      lightKeptShare: isLed
        ? assumptions.fill<number>(
            part.lightKeptShare,
            `${path}/lightKeptShare`,
            'lightKeptShare',
            defaults.lightKeptShare,
          )
        : 0,
    });
  });
  errors.push(...placeParts(document, faces, carriers, parts, assumptions));
  return { parts, errors };
}
