import type { AssemblyDocument, FaceName, Part } from '../../../shared/schemas/assembly.js';
import { faceNames } from '../../../shared/schemas/assembly.js';
import { boardConductivity } from '../conduction/board.js';
import { stackSpecificResistance } from '../conduction/contact.js';
import type { FieldError } from '../errors.js';
import type { Assumptions } from './assumptions.js';
import { defaults } from './defaults.js';
import { lookUp } from '../tables.js';
import { contentOf } from './inline-values.js';
import { isPolymer, resolveEmissivity, wallReferenceC } from './resolve-housing.js';
import type { ResolvedCarrier, ResolvedFace, ResolvedPart } from './resolved.js';

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

export function resolveCarriers(
  document: AssemblyDocument,
  faces: Record<FaceName, ResolvedFace>,
  assumptions: Assumptions,
): ResolvedCarrier[] {
  return document.carriers.map((carrier, i) => {
    const path = `/carriers/${String(i)}`;
    const common = { id: carrier.id, path, kind: carrier.kind, face: carrier.on.face, sizeM: carrier.sizeM };
    const area = carrier.sizeM[0] * carrier.sizeM[1];
    if (carrier.kind === 'plate') {
      const material = contentOf(carrier.material, `${path}/material`);
      const k = lookUp(material.conductivityWPerMK.value, wallReferenceC);
      const onPrint = isPolymer(faces[carrier.on.face].material);
      return {
        ...common,
        thicknessM: carrier.thicknessM,
        inPlane: k,
        through: k,
        polymer: isPolymer(material),
        emissivity: resolveEmissivity(carrier.finish, material, `${path}/finish`, 'of plates', assumptions),
        capacityJPerK: area * carrier.thicknessM * material.densityKgPerM3.value * material.specificHeatJPerKgK.value,
        jointKM2PerW: resolveJoint(carrier.on.stack, `${path}/on/stack`, onPrint, assumptions),
        standOffM: 0,
      };
    }
    const layers = carrier.layers.map((layer, j) => ({
      material: contentOf(layer.material, `${path}/layers/${String(j)}/material`),
      thickness: layer.thicknessM,
      coverage: layer.coverage,
    }));
    const board = boardConductivity(
      layers.map((layer) => ({
        conductivity: lookUp(layer.material.conductivityWPerMK.value, wallReferenceC),
        thickness: layer.thickness,
        coverage: layer.coverage,
      })),
    );
    const emissivity =
      carrier.finish === null
        ? assumptions.fill<number>(null, `${path}/finish`, 'emissivity boards', {
            ...defaults.emissivityOther,
            label: 'Emissivity of boards',
          })
        : contentOf(carrier.finish, `${path}/finish`).emissivity.value;
    return {
      ...common,
      thicknessM: board.thickness,
      inPlane: board.inPlane,
      through: board.through,
      polymer: false,
      emissivity,
      capacityJPerK: layers.reduce(
        (sum, layer) =>
          sum +
          area *
            layer.thickness *
            layer.coverage *
            layer.material.densityKgPerM3.value *
            layer.material.specificHeatJPerKgK.value,
        0,
      ),
      jointKM2PerW: 0,
      standOffM: assumptions.fill<number>(carrier.standOffM, `${path}/standOffM`, 'standOffM', defaults.standOffM),
    };
  });
}

function readMount(on: string, carriers: readonly ResolvedCarrier[]): ResolvedPart['on'] | null {
  const face = faceNames.find((name) => on === `face.${name}`);
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

export function resolveParts(
  document: AssemblyDocument,
  faces: Record<FaceName, ResolvedFace>,
  carriers: readonly ResolvedCarrier[],
  assumptions: Assumptions,
): { parts: ResolvedPart[]; errors: FieldError[] } {
  const errors: FieldError[] = [];
  const supplies = new Set(document.supplies.map((supply) => supply.id));
  const parts: ResolvedPart[] = [];
  document.parts.forEach((part, i) => {
    const path = `/parts/${String(i)}`;
    const type = contentOf(part.type, `${path}/type`);
    const on = readMount(part.mount.on, carriers);
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
        ? isPolymer(faces[on.face].material)
        : (carriers.find((carrier) => carrier.id === on.carrier)?.polymer ?? false);
    const isLed = type.electrical.kind === 'led';
    parts.push({
      id: part.id,
      path,
      label: part.name ?? part.id,
      type,
      on,
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
  return { parts, errors };
}
