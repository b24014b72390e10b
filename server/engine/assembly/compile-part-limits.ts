import type { PartType } from '../../../shared/schemas/part-type.js';
import type { RuleSet } from '../../../shared/schemas/rule-set.js';
import type { LimitInfo, NetworkBuilder } from './builder.js';
import { groundOf } from './compile-parts.js';
import type { ResolvedPart } from './resolved.js';

type Rule = RuleSet['perClass'][number] | undefined;
type Rating = PartType['ratings'][number];

/** Node whose temperature a derating curve refers to. “Ambient” of a part in a box is the air that it stands in. */
function referenceNode(part: ResolvedPart, reference: string, air: string): string {
  if (reference === 'ambient') return air;
  return reference === 'board' ? groundOf(part).peak : `part.${part.id}.case`;
}

function info(part: ResolvedPart, suffix: string, what: string, rule: string, rating: Rating['max']) {
  return {
    group: `part.${part.id}.${suffix}`,
    label: `${part.label}, ${what}`,
    part: part.id,
    basis: { reason: '', source: rating.source, standing: rating.standing, rule },
  };
}

/** Power rating of the whole bank [W], from a power or a voltage rating of one element (P = U²/R). */
function bankPower(part: ResolvedPart, rating: Rating): number | null {
  const { electrical } = part.type;
  if (rating.quantity === 'powerW') return rating.max.value * part.count;
  if (rating.quantity === 'voltageV' && electrical.kind === 'resistor') {
    return (rating.max.value ** 2 / electrical.resistanceOhm.value) * part.count;
  }
  return null;
}

function ratingLimit(
  builder: NetworkBuilder,
  part: ResolvedPart,
  rating: Rating,
  rules: RuleSet,
  rule: Rule,
  air: string,
): void {
  const stress = rule?.largestStressRatio.value ?? 1;
  const ruleText = rule ? `${rules.name}: ${rule.largestStressRatio.source}` : rules.name;
  const { electrical, deratingCurve: curve } = part.type;
  const id = `part.${part.id}.rating.${rating.quantity}`;
  const label = { powerW: 'power', currentA: 'current', voltageV: 'voltage, as power', outputW: 'output' }[
    rating.quantity
  ];
  const common = info(part, `rating.${rating.quantity}`, label, ruleText, rating.max);
  const basis = (reason: string): LimitInfo['basis'] => ({ ...common.basis, reason });

  const watts = bankPower(part, rating);
  if (watts !== null) {
    const derating =
      rating.quantity === 'powerW' && curve?.quantity === 'powerW'
        ? { referenceNode: referenceNode(part, curve.reference, air), points: curve.points.value }
        : undefined;
    builder.limit(
      { id, node: `part.${part.id}.junction`, maxW: watts, maxShare: 1, derating },
      {
        ...common,
        kind: 'power',
        unit: '1',
        askedMargin: 1 - stress,
        basis: basis(
          derating
            ? `Derating curve of the ${String(watts)} W rating against the ${curve?.reference ?? ''} temperature`
            : `Rating of ${String(watts)} W`,
        ),
      },
    );
    return;
  }
  if (rating.quantity === 'currentA') {
    const maxA = rating.max.value * (part.arrangement === 'parallel' ? part.count : 1);
    builder.limit(
      { id, node: `part.${part.id}.junction`, maxA },
      {
        ...common,
        kind: 'current',
        unit: 'A',
        askedMargin: maxA * (1 - stress),
        basis: basis(`Rating of ${String(maxA)} A`),
      },
    );
    return;
  }
  if (rating.quantity === 'outputW' && electrical.kind === 'converter' && part.supply !== null) {
    const maxA = rating.max.value / electrical.outputV.value;
    builder.limit(
      { id, supply: part.supply, maxA },
      {
        ...common,
        kind: 'current',
        unit: 'A',
        askedMargin: maxA * (1 - stress),
        basis: basis(`Rated output of ${String(rating.max.value)} W at ${String(electrical.outputV.value)} V`),
      },
    );
    return;
  }
  builder.warnings.push({
    code: 'rating-not-checked',
    node: `part.${part.id}.junction`,
    message: `The ${label} rating of ${part.label} cannot be checked for this kind of part`,
  });
}

/** Temperature limits, ratings and derating curve of one part. */
export function compilePartLimits(builder: NetworkBuilder, part: ResolvedPart, rules: RuleSet, air: string): void {
  const rule = rules.perClass.find((row) => row.class === part.type.class);
  for (const limit of part.type.temperatureLimits) {
    const node = `part.${part.id}.${limit.spot}`;
    builder.limit(
      { id: `${node}.max`, node, maxC: limit.maxC.value },
      {
        group: `${node}.max`,
        label: `${part.label}, ${limit.spot === 'junction' ? 'hottest inside' : 'body'}`,
        kind: 'temperature',
        unit: '°C',
        askedMargin: rule?.smallestMarginK.value ?? 0,
        part: part.id,
        basis: {
          reason: `Largest ${limit.spot} temperature of ${part.type.name}`,
          source: limit.maxC.source,
          standing: limit.maxC.standing,
          rule: rule ? `${rules.name}: ${rule.smallestMarginK.source}` : rules.name,
        },
      },
    );
  }
  for (const rating of part.type.ratings) ratingLimit(builder, part, rating, rules, rule, air);
  const curve = part.type.deratingCurve;
  if (curve && (curve.quantity !== 'powerW' || !part.type.ratings.some((rating) => rating.quantity === 'powerW'))) {
    builder.warnings.push({
      code: 'derating-not-checked',
      node: `part.${part.id}.junction`,
      message: `The derating curve of ${part.label} is on ${curve.quantity === 'powerW' ? 'a power rating that is missing' : curve.quantity} and is not checked`,
    });
  }
}
