import type { RuleSet } from '../../../shared/schemas/rule-set.js';
import type { Drive, Warning } from '../../../shared/schemas/network-answers.js';
import type { NetworkDocument } from '../../../shared/schemas/network.js';
import { pressureIcao } from '../atmosphere.js';
import type { WallBand } from '../conduction/printed-wall.js';
import { NetworkBuilder, type LimitInfo, type NodeInfo } from './builder.js';
import { compileHousing, faceModels, interiorFaces, type ResolvedScenario } from './compile-housing.js';
import { compileLimits } from './compile-limits.js';
import { compileParts } from './compile-parts.js';
import { innerSize } from './geometry.js';
import type { ResolvedAssembly } from './resolved.js';
import { convectionLink, interiorRadiation } from './surfaces.js';

export interface CompiledAssembly {
  network: NetworkDocument;
  nodes: NodeInfo[];
  limits: LimitInfo[];
  drive: Drive;
  warnings: Warning[];
}

/** Heat capacity of a cubic metre of air, ρ c_p near 40 °C [J/(m³ K)]. */
const airCapacityPerM3 = 1130;

/**
 * The network of a sealed box in one scenario.
 *
 * Six faces with an inside and an outside each, the inside air, one mean radiant node, carriers and parts; every surface
 * meets its air by natural convection and its surroundings by radiation.
 *
 * @param band which end of the printed-wall band is taken
 */
export function compileAssembly(
  assembly: ResolvedAssembly,
  scenario: ResolvedScenario,
  rules: RuleSet,
  band: WallBand = 'mid',
): CompiledAssembly {
  const builder = new NetworkBuilder();
  const models = faceModels(assembly, band);
  const [x, y, z] = innerSize(assembly.document.housing.outerM, {
    top: models.top.face.wallM,
    bottom: models.bottom.face.wallM,
    front: models.front.face.wallM,
    back: models.back.face.wallM,
    left: models.left.face.wallM,
    right: models.right.face.wallM,
  });
  compileHousing(builder, assembly, scenario, models);
  builder.node('air.inside', 'air', 'Air inside', { capacityJPerK: airCapacityPerM3 * x * y * z });
  builder.node('radiant.inside', 'air', 'Mean radiant temperature inside');
  const { surfaces, covered } = compileParts(builder, assembly, models);
  const inside = [...interiorFaces(assembly, models, covered), ...surfaces];
  for (const surface of inside) builder.link(convectionLink(surface, 'air.inside'));
  interiorRadiation(builder, inside, 'radiant.inside');
  compileLimits(builder, assembly, models, rules);
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
