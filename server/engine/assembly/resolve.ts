import { faceNames, type AssemblyDocument } from '../../../shared/schemas/assembly.js';
import { EngineError, type FieldError } from '../errors.js';
import { Assumptions } from './assumptions.js';
import { defaults } from './defaults.js';
import { faceSize, innerSize } from './geometry.js';
import { resolveFaces } from './resolve-housing.js';
import { resolveCarriers, resolveParts } from './resolve-parts.js';
import type { ResolvedAssembly, ResolvedCarrier, ResolvedFace, ResolvedPart } from './resolved.js';

/** Slack when sizes typed in millimetres are compared [m]. */
const slack = 1e-6;

function repeated(items: readonly { id: string }[], list: string, what: string): FieldError[] {
  const seen = new Set<string>();
  return items.flatMap((item, i) => {
    if (!seen.has(item.id)) {
      seen.add(item.id);
      return [];
    }
    return [{ path: `/${list}/${String(i)}/id`, message: `Two ${what} have the id “${item.id}”` }];
  });
}

function fits(size: readonly [number, number], room: readonly [number, number]): boolean {
  const [a, b] = [...size].sort((p, q) => p - q) as [number, number];
  const [c, d] = [...room].sort((p, q) => p - q) as [number, number];
  return a <= c + slack && b <= d + slack;
}

/** A bank is taken as one body of the same total area: it must fit by area, one element by its sides. */
function checkFit(part: ResolvedPart, room: readonly [number, number], where: string): FieldError[] {
  const size = part.type.footprintM.value;
  if (fits(size, room) && size[0] * size[1] * part.count <= room[0] * room[1] + slack * slack) return [];
  return [{ path: `${part.path}/mount/on`, message: `${part.label} does not fit on ${where}` }];
}

function checkGeometry(
  document: AssemblyDocument,
  faces: Record<(typeof faceNames)[number], ResolvedFace>,
  carriers: readonly ResolvedCarrier[],
  parts: readonly ResolvedPart[],
): FieldError[] {
  const { outerM } = document.housing;
  const inner = innerSize(outerM, {
    top: faces.top.wallM,
    bottom: faces.bottom.wallM,
    front: faces.front.wallM,
    back: faces.back.wallM,
    left: faces.left.wallM,
    right: faces.right.wallM,
  });
  const tooThick = inner.findIndex((length) => length <= slack);
  if (tooThick >= 0) {
    return [
      { path: `/housing/outerM/${String(tooThick)}`, message: 'The walls leave no room inside in this direction' },
    ];
  }
  const errors: FieldError[] = [];
  for (const carrier of carriers) {
    if (!fits(carrier.sizeM, faceSize(carrier.face, inner))) {
      errors.push({ path: `${carrier.path}/sizeM`, message: `It does not fit inside the ${carrier.face} face` });
    }
  }
  for (const face of faceNames) {
    const [u, v] = faceSize(face, inner);
    const here = carriers.filter((carrier) => carrier.face === face && carrier.kind === 'plate');
    const taken =
      here.reduce((sum, carrier) => sum + carrier.sizeM[0] * carrier.sizeM[1], 0) +
      parts.reduce(
        (sum, part) =>
          part.on.kind === 'face' && part.on.face === face
            ? sum + part.count * part.type.footprintM.value[0] * part.type.footprintM.value[1]
            : sum,
        0,
      );
    if (taken > u * v + slack * slack) {
      const last = here.at(-1)?.path ?? parts.find((part) => part.on.kind === 'face' && part.on.face === face)?.path;
      errors.push({ path: last ?? `/housing/faces/${face}`, message: `The ${face} face has no room for all of this` });
    }
  }
  for (const part of parts) {
    const { on } = part;
    if (on.kind === 'face') errors.push(...checkFit(part, faceSize(on.face, inner), `the ${on.face} face`));
    else {
      const carrier = carriers.find(({ id }) => id === on.carrier);
      if (carrier) errors.push(...checkFit(part, carrier.sizeM, `“${carrier.id}”`));
    }
  }
  for (const carrier of carriers) {
    const taken = parts.reduce(
      (sum, part) =>
        part.on.kind === 'carrier' && part.on.carrier === carrier.id
          ? sum + part.count * part.type.footprintM.value[0] * part.type.footprintM.value[1]
          : sum,
      0,
    );
    if (taken > carrier.sizeM[0] * carrier.sizeM[1] + slack * slack) {
      errors.push({ path: `${carrier.path}/sizeM`, message: 'The parts on it need more room than it has' });
    }
  }
  return errors;
}

function resolveDrive(document: AssemblyDocument, parts: readonly ResolvedPart[]): ResolvedAssembly['drive'] {
  if (document.drive !== null) return document.drive;
  const first = document.supplies.find((supply) => parts.some((part) => part.supply === supply.id));
  if (first) return { supply: first.id };
  return { parts: parts.filter((part) => part.type.electrical.kind === 'heat').map((part) => part.id) };
}

function checkDrive(drive: ResolvedAssembly['drive'], document: AssemblyDocument, parts: readonly ResolvedPart[]) {
  if ('supply' in drive) {
    return document.supplies.some((supply) => supply.id === drive.supply)
      ? []
      : [{ path: '/drive/supply', message: `There is no supply “${drive.supply}”` }];
  }
  return drive.parts.flatMap((id, i) => {
    const part = parts.find((candidate) => candidate.id === id);
    if (part?.type.electrical.kind === 'heat') return [];
    const message = part ? 'Only parts with a given heat can be driven directly' : `There is no part “${id}”`;
    return [{ path: `/drive/parts/${String(i)}`, message }];
  });
}

/**
 * The document with every “don’t know” replaced by its default, and checked as a whole.
 *
 * @param document every value in place (`inline`)
 * @param typical keys of the assumptions that shall take their typical value
 * @throws EngineError `invalid-document` with one entry per offending field
 */
export function resolveAssembly(document: AssemblyDocument, typical?: ReadonlySet<string>): ResolvedAssembly {
  const assumptions = new Assumptions(typical);
  const faces = resolveFaces(document, assumptions);
  const carriers = resolveCarriers(document, faces, assumptions);
  const { parts, errors: partErrors } = resolveParts(document, faces, carriers, assumptions);
  const drive = resolveDrive(document, parts);
  const errors = [
    ...repeated(document.parts, 'parts', 'parts'),
    ...repeated(document.carriers, 'carriers', 'carriers'),
    ...repeated(document.supplies, 'supplies', 'supplies'),
    ...repeated(document.scenarios, 'scenarios', 'scenarios'),
    ...repeated(document.limits, 'limits', 'limits'),
    ...partErrors,
    ...checkGeometry(document, faces, carriers, parts),
    ...checkDrive(drive, document, parts),
  ];
  if (errors.length > 0) {
    throw new EngineError('invalid-document', errors[0]?.message ?? 'The assembly cannot be computed', errors);
  }
  const touched = assumptions.fill<string>(
    document.housing.touched,
    '/housing/touched',
    'touched',
    defaults.touched,
  ) as ResolvedAssembly['touched'];
  const scenarios = document.scenarios.map((scenario, i) => {
    const airC = assumptions.fill<number>(scenario.airC, `/scenarios/${String(i)}/airC`, 'airC', defaults.airC);
    return { ...scenario, airC, surroundingsC: scenario.surroundingsC ?? airC };
  });
  return { document, faces, carriers, parts, touched, scenarios, drive, assumptions: assumptions.list() };
}
