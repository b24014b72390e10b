import { faceNames } from '../../../shared/schemas/assembly.js';
import type { RuleSet, touchSurfaces } from '../../../shared/schemas/rule-set.js';
import { EngineError } from '../errors.js';
import type { NetworkBuilder } from './builder.js';
import { faceLabel, type BoxModel } from './box.js';
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

/** Those of the named places that are there, and every place whose name begins so. */
function nodesOf(builder: NetworkBuilder, prefix: string, named: readonly string[]): string[] {
  return [
    ...named.filter((id) => builder.has(id)),
    ...builder.nodeInfo.filter(({ id }) => id.startsWith(prefix)).map(({ id }) => id),
  ];
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
  const nodes = nodesOf(builder, `face.${face.name}.peak.`, [
    `face.${face.name}.inner`,
    `face.${face.name}.outer`,
    `face.${face.name}.hotSpot`,
  ]);
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

/** The hottest place of a face’s outside: its hottest cell, or the face where it is not divided. */
function hottestOutside(builder: NetworkBuilder, face: string): string[] {
  return [builder.has(`face.${face}.hotSpot`) ? `face.${face}.hotSpot` : `face.${face}.outer`];
}

function touchLimits(builder: NetworkBuilder, assembly: ResolvedAssembly, face: ResolvedFace, rules: RuleSet): void {
  const { touched } = assembly;
  if (touched === 'no' || !['open', 'near'].includes(face.exposure.kind)) return;
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
  for (const node of hottestOutside(builder, face.name)) {
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

/** The document’s own limits. `face.<name>.hotSpot` stands for the face’s outside where that is not divided into cells. */
function ownLimits(builder: NetworkBuilder, assembly: ResolvedAssembly): void {
  assembly.document.limits.forEach((limit, i) => {
    const hot = /^face\.(\w+)\.hotSpot$/.exec(limit.node);
    const nodes = hot ? hottestOutside(builder, hot[1] ?? '') : [limit.node];
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

/** The air that parts stand in. */
function airOf(builder: NetworkBuilder): string {
  return ['air.inside', 'fill.inside'].find((id) => builder.has(id)) ?? 'ambient';
}

/** The fill’s own limit, where it is hottest: in its middle and at the parts in it. */
function fillLimits(builder: NetworkBuilder, assembly: ResolvedAssembly): void {
  const fill = assembly.box?.housing.fill;
  if (!fill || fill.kind === 'air' || fill.maxC === null) return;
  const group = 'fill.max';
  const touching = builder.links.flatMap((link) =>
    'to' in link && link.to === 'fill.inside' && link.from.endsWith('.case') ? [link.from] : [],
  );
  for (const node of new Set(['fill.inside', ...touching])) {
    builder.limit(
      { id: `${group}@${node}`, node, maxC: fill.maxC },
      {
        group,
        label: fill.kind === 'foam' ? 'Foam' : 'Potting',
        kind: 'temperature',
        unit: '°C',
        askedMargin: 0,
        basis: {
          reason: `Highest temperature of the ${fill.kind}`,
          source: 'entered in the assembly',
          standing: 'data-sheet',
        },
      },
    );
  }
}

/** Every limit of the assembly, with what the rule set asks beyond it. */
export function compileLimits(
  builder: NetworkBuilder,
  assembly: ResolvedAssembly,
  box: BoxModel | null,
  rules: RuleSet,
): void {
  for (const part of assembly.parts) compilePartLimits(builder, part, rules, airOf(builder));
  if (box) {
    for (const name of faceNames) {
      softeningLimits(builder, box.models[name].face, rules);
      touchLimits(builder, assembly, box.models[name].face, rules);
    }
    fillLimits(builder, assembly);
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
