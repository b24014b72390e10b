import { faceNames, type FaceName } from '../../../shared/schemas/assembly.js';
import type { RuleSet, touchSurfaces } from '../../../shared/schemas/rule-set.js';
import { EngineError } from '../errors.js';
import type { NetworkBuilder } from './builder.js';
import { faceLabel, type FaceModel } from './compile-housing.js';
import { compilePartLimits } from './compile-part-limits.js';
import { isPolymer } from './resolve-housing.js';
import type { ResolvedAssembly, ResolvedFace } from './resolved.js';
import { softeningOf } from './softening.js';

/** Emissivity below which a metal’s outside counts as bare. */
const bareMetalEmissivity = 0.3;

type TouchSurface = (typeof touchSurfaces)[number];

function touchSurface(face: ResolvedFace): TouchSurface {
  const { group } = face.material;
  if (group === 'metal') return face.emissivityOutside < bareMetalEmissivity ? 'bare-metal' : 'coated-metal';
  if (group === 'ceramic') return 'ceramic-glass';
  return group === 'wood' ? 'wood' : 'plastic';
}

function nodesOf(builder: NetworkBuilder, prefix: string, fixed: readonly string[]): string[] {
  return [...fixed, ...builder.nodeInfo.filter(({ id }) => id.startsWith(prefix)).map(({ id }) => id)];
}

function softeningLimits(builder: NetworkBuilder, face: ResolvedFace, rules: RuleSet): void {
  if (!isPolymer(face.material)) return;
  const group = `face.${face.name}.softening`;
  const softening = softeningOf(face.material, face.loadState);
  if (softening === null) {
    builder.warnings.push({
      code: 'no-softening-value',
      node: `face.${face.name}.inner`,
      message: `${face.material.name} has no softening value: the ${face.name} face is not checked against softening`,
    });
    return;
  }
  const margin = rules.polymerMarginK[face.loadState];
  const limitC = softening.temperatureC - margin.value;
  const nodes = nodesOf(builder, `face.${face.name}.peak.`, [`face.${face.name}.inner`, `face.${face.name}.outer`]);
  for (const node of nodes) {
    builder.limit(
      { id: `${group}@${node}`, node, maxC: limitC },
      {
        group,
        label: `${faceLabel(face.name)} softens`,
        kind: 'temperature',
        unit: '°C',
        askedMargin: rules.wallMarginK.value,
        basis: {
          reason: `${face.material.name}, ${face.loadState}: ${softening.reason} ${String(softening.temperatureC)} °C less ${String(margin.value)} K`,
          source: softening.source,
          standing: softening.standing,
          rule: `${rules.name}: ${margin.source}`,
        },
      },
    );
  }
  if (face.loadState === 'screw-clamped' || face.loadState === 'structural') {
    builder.warnings.push({
      code: 'creep',
      node: `face.${face.name}.inner`,
      message: `The ${face.name} face is ${face.loadState}: creep will relax the clamp well below the softening temperature`,
    });
  }
}

function touchLimits(builder: NetworkBuilder, assembly: ResolvedAssembly, face: ResolvedFace, rules: RuleSet): void {
  const { touched } = assembly;
  if (touched === 'no' || !face.open) return;
  const surface = touchSurface(face);
  const entry = rules.touchLimits.find((row) => row.surface === surface && row.contactTime === touched);
  if (!entry) {
    builder.warnings.push({
      code: 'no-touch-limit',
      node: `face.${face.name}.outer`,
      message: `The rule set has no touch limit for ${surface} over ${touched}: the ${face.name} face is not checked for touch`,
    });
    return;
  }
  const group = `face.${face.name}.touch`;
  for (const node of nodesOf(builder, `face.${face.name}.hotSpot.`, [`face.${face.name}.outer`])) {
    builder.limit(
      { id: `${group}@${node}`, node, maxC: entry.maxC.value },
      {
        group,
        label: `${faceLabel(face.name)} touched`,
        kind: 'temperature',
        unit: '°C',
        askedMargin: rules.touchMarginK.value,
        basis: {
          reason: `Touch limit of ${surface.replace('-', ' ')} over ${touched}`,
          source: entry.maxC.source,
          standing: entry.maxC.standing,
          rule: `${rules.name}: ${rules.touchMarginK.source}`,
        },
      },
    );
  }
}

/** The document’s own limits. `face.<name>.hotSpot` stands for every hot spot of that face’s outside. */
function ownLimits(builder: NetworkBuilder, assembly: ResolvedAssembly): void {
  assembly.document.limits.forEach((limit, i) => {
    const hot = /^face\.(\w+)\.hotSpot$/.exec(limit.node);
    const nodes = hot ? nodesOf(builder, `${limit.node}.`, [`face.${hot[1] ?? ''}.outer`]) : [limit.node];
    const missing = nodes.find((node) => !builder.has(node));
    if (missing !== undefined) {
      throw new EngineError('unknown-reference', `There is no node “${missing}”`, [
        { path: `/limits/${String(i)}/node`, message: `There is no node “${missing}” in the network` },
      ]);
    }
    const label = builder.nodeInfo.find(({ id }) => id === nodes[0])?.label ?? limit.node;
    for (const node of nodes) {
      builder.limit(
        { id: `limit.${limit.id}@${node}`, node, maxC: limit.maxC },
        {
          group: `limit.${limit.id}`,
          label,
          kind: 'temperature',
          unit: '°C',
          askedMargin: 0,
          basis: { reason: limit.reason, source: 'entered in the assembly', standing: 'common-practice' },
        },
      );
    }
  });
}

/** Every limit of the assembly, with what the rule set asks beyond it. */
export function compileLimits(
  builder: NetworkBuilder,
  assembly: ResolvedAssembly,
  models: Record<FaceName, FaceModel>,
  rules: RuleSet,
): void {
  for (const part of assembly.parts) compilePartLimits(builder, part, rules);
  for (const name of faceNames) {
    softeningLimits(builder, models[name].face, rules);
    touchLimits(builder, assembly, models[name].face, rules);
  }
  for (const supply of assembly.document.supplies) {
    if (supply.maxA === null) continue;
    builder.limit(
      { id: `supply.${supply.id}.rating`, supply: supply.id, maxA: supply.maxA },
      {
        group: `supply.${supply.id}.rating`,
        label: `Supply ${supply.name ?? supply.id}`,
        kind: 'current',
        unit: 'A',
        askedMargin: 0,
        basis: { reason: 'Rating of the supply', source: 'entered in the assembly', standing: 'data-sheet' },
      },
    );
  }
  ownLimits(builder, assembly);
}
