import type { CeilingAnswer, Drive } from '../../../shared/schemas/network-answers.js';
import type { NetworkDocument, NetworkLimit } from '../../../shared/schemas/network.js';
import type { LimitInfo } from '../assembly/builder.js';
import type { WallBand } from '../conduction/printed-wall.js';
import { withSecondCorrelations } from '../network/solve.js';
import { findCeiling } from './ceiling.js';

function guardLimit(limit: NetworkLimit, asked: number): NetworkLimit {
  if ('maxC' in limit) return { ...limit, maxC: limit.maxC - asked };
  if ('maxW' in limit) return { ...limit, maxShare: Math.max(limit.maxShare - asked, 1e-3) };
  return { ...limit, maxA: Math.max(limit.maxA - asked, 1e-9) };
}

/** The same network with every limit tightened by what the rules ask. */
export function withAskedMargins(document: NetworkDocument, limits: readonly LimitInfo[]): NetworkDocument {
  const asked = new Map(limits.map((limit) => [limit.id, limit.askedMargin]));
  return { ...document, limits: document.limits.map((limit) => guardLimit(limit, asked.get(limit.id) ?? 0)) };
}

/** Scale of a ceiling as a number to be compared: none within range is more than any. */
export function comparableScale(ceiling: CeilingAnswer): number {
  if (ceiling.status === 'no-limit-within-range') return Infinity;
  return ceiling.status === 'exceeded-at-zero' ? -1 : ceiling.scale;
}

/** The bands worth trying: only a printed wall with a core has any. */
export function bandsOf(hasPrintedWall: boolean): WallBand[] {
  return hasPrintedWall ? ['mid', 'low', 'high'] : ['mid'];
}

/**
 * The guarded drive ceiling: the least over both correlations and the given networks (one per end of the printed-wall
 * band), with every limit tightened by the margin that the rule set asks. Never above the nominal one, since the
 * nominal network with its own limits tightened is among them.
 */
export function guardedCeiling(
  networks: readonly NetworkDocument[],
  limits: readonly LimitInfo[],
  drive: Drive,
): CeilingAnswer {
  const candidates = networks.flatMap((network) => {
    const guarded = withAskedMargins(network, limits);
    return [guarded, withSecondCorrelations(guarded)].map((document) =>
      findCeiling(document, drive, { onlyBinding: true }),
    );
  });
  return candidates.reduce((least, ceiling) => (comparableScale(ceiling) < comparableScale(least) ? ceiling : least));
}
