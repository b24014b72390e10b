import type { RuleSet } from '../../../shared/schemas/rule-set.js';
import type { Drive, Warning } from '../../../shared/schemas/network-answers.js';
import type { NetworkDocument } from '../../../shared/schemas/network.js';
import { faceNames } from '../../../shared/schemas/assembly.js';
import { pressureIcao } from '../atmosphere.js';
import type { WallBand } from '../conduction/printed-wall.js';
import { compileAirExchange } from './airflow.js';
import { NetworkBuilder, type LimitInfo, type NodeInfo } from './builder.js';
import { compileCarriers, coveredByBoards } from './compile-carriers.js';
import { boxModel, faceSurface, type BoxModel } from './box.js';
import { compileHousing } from './compile-housing.js';
import { compileLimits } from './compile-limits.js';
import { compileParts } from './compile-parts.js';
import { bury, conductThroughFill, fillsAll, meetInsideAir, openSurface } from './fill.js';
import { compileLeads } from './leads.js';
import { compileRoom, compileSun } from './outside.js';
import type { ResolvedAssembly, ResolvedScenario } from './resolved.js';
import type { Surface } from './surfaces.js';

export interface CompiledAssembly {
  network: NetworkDocument;
  nodes: NodeInfo[];
  limits: LimitInfo[];
  drive: Drive;
  warnings: Warning[];
}

/** Heat capacity of a cubic metre of air, ρ c_p near 40 °C [J/(m³ K)]. */
const airCapacityPerM3 = 1130;

/** The free inside of each face. What lies on a gridded face its grid knows itself; on the others only close boards cover anything. */
function faceInsides(box: BoxModel, scenario: ResolvedScenario): Surface[] {
  return faceNames.flatMap((name) => {
    const surface = faceSurface(box, name, 'inside', scenario);
    const lying = box.assembly.carriers
      .filter(({ face, kind }) => face === name && kind === 'plate')
      .reduce((sum, { at }) => sum + at.sizeM[0] * at.sizeM[1], 0);
    const mounted = box.assembly.parts
      .filter(({ on }) => on.kind === 'face' && on.face === name)
      .reduce((sum, { at }) => sum + at.sizeM[0] * at.sizeM[1], 0);
    const areaM2 = surface.areaM2 - lying - mounted - coveredByBoards(box.assembly.carriers, box, name);
    return areaM2 > 1e-9 ? [{ ...surface, areaM2 }] : [];
  });
}

function compileInside(
  builder: NetworkBuilder,
  box: BoxModel,
  parts: readonly Surface[],
  scenario: ResolvedScenario,
): void {
  const { fill } = (box.assembly.box as NonNullable<ResolvedAssembly['box']>).housing;
  const insides = [...faceInsides(box, scenario), ...parts];
  const [x, y, z] = box.innerM;
  // A fill up to the opposite wall leaves no air.
  const airy = fill.kind === 'air' || (fill.kind === 'potting' && !fillsAll(box, fill));
  if (airy) {
    builder.node('air.inside', 'air', 'Air inside', { capacityJPerK: airCapacityPerM3 * x * y * z });
    builder.node('radiant.inside', 'air', 'Mean radiant temperature inside');
  }
  if (fill.kind === 'air') meetInsideAir(builder, insides);
  else {
    const buried = bury(insides, box.assembly, box, fill);
    conductThroughFill(builder, buried, box, fill, scenario);
    if (airy && fill.kind === 'potting') {
      const open = builder.has('fill.surface') ? [openSurface(box, fill.onFace, scenario)] : [];
      meetInsideAir(builder, [...buried, ...open]);
    }
  }
  if (airy) compileAirExchange(builder, box, scenario);
}

/**
 * The network of an assembly in one scenario.
 *
 * A box has six faces with an inside and an outside each, divided into cells where something is joined to them; the inside air and one mean
 * radiant node, or a fill; carriers as grids, parts, leads; every surface meets its air by convection and its surroundings by
 * radiation. An open assembly has its carriers in the room.
 *
 * @param options `band`: which end of the printed-wall band is taken; `refine`: divides all cells
 */
export function compileAssembly(
  assembly: ResolvedAssembly,
  scenario: ResolvedScenario,
  rules: RuleSet,
  options: { band?: WallBand; refine?: number } = {},
): CompiledAssembly {
  const builder = new NetworkBuilder(options.refine);
  const box = boxModel(assembly, options.band ?? 'mid');
  compileRoom(builder, scenario);
  if (box) compileHousing(builder, box, scenario);
  const carriers = compileCarriers(builder, assembly.carriers, box, scenario);
  const parts = compileParts(builder, assembly, box, scenario);
  if (box) {
    compileInside(builder, box, [...carriers, ...parts], scenario);
    compileSun(builder, box, scenario);
  }
  compileLeads(builder, assembly);
  compileLimits(builder, assembly, box, rules);
  const network = builder.document(
    pressureIcao(scenario.altitudeM),
    assembly.document.supplies.map(({ id, currentA }) => ({ id, currentA })),
  );
  return {
    network,
    nodes: builder.nodeInfo,
    limits: builder.limitInfo,
    drive:
      'supply' in assembly.drive
        ? assembly.drive
        : { sources: assembly.drive.parts.map((id) => `part.${id}.junction`) },
    warnings: builder.warnings,
  };
}
