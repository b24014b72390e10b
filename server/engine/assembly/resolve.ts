import { faceNames, type AssemblyDocument, type Housing } from '../../../shared/schemas/assembly.js';
import { EngineError, type FieldError } from '../errors.js';
import { Assumptions } from './assumptions.js';
import { defaults } from './defaults.js';
import { innerSize } from './geometry.js';
import { upward } from './pose.js';
import { resolveFaces } from './resolve-housing.js';
import { resolveCarriers, resolveLeads, resolveParts } from './resolve-parts.js';
import type { Faces, ResolvedAssembly, ResolvedPart, ResolvedScenario } from './resolved.js';

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

/** Whether the walls leave room inside, before anything is laid there. */
function checkWalls(housing: Housing, faces: Faces): FieldError[] {
  const inner = innerSize(
    housing.outerM,
    Object.fromEntries(faceNames.map((name) => [name, faces[name].wallM])) as Record<
      (typeof faceNames)[number],
      number
    >,
  );
  const tooThick = inner.findIndex((length) => length <= slack);
  if (tooThick < 0) return [];
  return [{ path: `/housing/outerM/${String(tooThick)}`, message: 'The walls leave no room inside in this direction' }];
}

/** What stands in the way of the air: fills, fans without an opening. */
function checkAir(housing: Housing): FieldError[] {
  const errors: FieldError[] = [];
  const vented = faceNames.filter((name) => housing.faces[name].vents.length > 0);
  if (housing.fan && vented.length === 0) {
    errors.push({ path: '/housing/fan', message: 'A fan needs openings: add vents to the faces that the air passes' });
  }
  if (housing.fill.kind === 'foam') {
    for (const name of vented) {
      const path = `/housing/faces/${name}/vents`;
      errors.push({ path, message: 'Foam fills the housing: no air passes these openings' });
    }
  }
  const curve = housing.fan?.curve;
  if (curve) {
    const rising = curve.every(([flow, pressure], i) => {
      const before = curve[i - 1];
      return !before || (flow > before[0] && pressure <= before[1]);
    });
    if (!rising) {
      const message = 'A fan curve rises in flow and falls in pressure from point to point';
      errors.push({ path: '/housing/fan/curve', message });
    }
  }
  return errors;
}

/** Whether any heat can leave at all. */
function checkWayOut(document: AssemblyDocument, housing: Housing): FieldError[] {
  const closed = faceNames.every((name) => {
    const { exposure } = housing.faces[name];
    return exposure.kind === 'against-wall' && exposure.surfaceC === null;
  });
  const cooled = document.leads.length > 0 || document.carriers.some(({ kind }) => kind === 'fins');
  if (!closed || cooled) return [];
  const message =
    'All six faces are held against something that takes no heat: leave one open, or give it a temperature';
  return faceNames.map((name) => ({ path: `/housing/faces/${name}/exposure/kind`, message }));
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

function resolveScenarios(document: AssemblyDocument, assumptions: Assumptions): ResolvedScenario[] {
  return document.scenarios.map((scenario, i) => {
    const path = `/scenarios/${String(i)}`;
    const airC = assumptions.fill<number>(scenario.airC, `${path}/airC`, 'airC', defaults.airC);
    const { housing } = document;
    if (housing === null && scenario.pose !== null) {
      const message = 'An open assembly has no pose: say of each carrier which way it looks';
      throw new EngineError('invalid-document', message, [{ path: `${path}/pose`, message }]);
    }
    const pose = scenario.pose ?? housing?.pose ?? { up: 'top' as const, tiltDeg: 0, towards: null };
    const up = upward(pose, scenario.pose ? `${path}/pose` : '/housing/pose');
    return { ...scenario, path, airC, surroundingsC: scenario.surroundingsC ?? airC, up };
  });
}

function refuse(errors: readonly FieldError[]): void {
  if (errors.length === 0) return;
  throw new EngineError('invalid-document', errors[0]?.message ?? 'The assembly cannot be computed', [...errors]);
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
  const { housing } = document;
  const faces = resolveFaces(document, assumptions);
  if (housing && faces)
    refuse([...checkWalls(housing, faces), ...checkAir(housing), ...checkWayOut(document, housing)]);
  const { carriers, errors: carrierErrors } = resolveCarriers(document, faces, assumptions);
  const { parts, errors: partErrors } = resolveParts(document, faces, carriers, assumptions);
  const { leads, errors: leadErrors } = resolveLeads(document, parts);
  const drive = resolveDrive(document, parts);
  refuse([
    ...repeated(document.parts, 'parts', 'parts'),
    ...repeated(document.carriers, 'carriers', 'carriers'),
    ...repeated(document.supplies, 'supplies', 'supplies'),
    ...repeated(document.scenarios, 'scenarios', 'scenarios'),
    ...repeated(document.limits, 'limits', 'limits'),
    ...repeated(document.leads, 'leads', 'leads'),
    ...carrierErrors,
    ...partErrors,
    ...leadErrors,
    ...checkDrive(drive, document, parts),
  ]);
  const touched = housing
    ? (assumptions.fill<string>(
        housing.touched,
        '/housing/touched',
        'touched',
        defaults.touched,
      ) as ResolvedAssembly['touched'])
    : 'no';
  const scenarios = resolveScenarios(document, assumptions);
  return {
    document,
    box: housing && faces ? { housing, faces } : null,
    carriers,
    parts,
    leads,
    touched,
    scenarios,
    drive,
    assumptions: assumptions.list(),
  };
}
