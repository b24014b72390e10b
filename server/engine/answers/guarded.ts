import type { CeilingAnswer, Drive } from '../../../shared/schemas/network-answers.js';
import type { NetworkDocument, NetworkLimit } from '../../../shared/schemas/network.js';
import type { LimitInfo } from '../assembly/builder.js';
import type { WallBand } from '../conduction/printed-wall.js';
import type { PreparedNetwork } from '../network/prepared.js';
import { withSecondCorrelations } from '../network/solve.js';
import { ceilingAlong, ceilingBelow, findCeiling } from './ceiling.js';
import { Trajectory } from './trajectory.js';

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

/** Whether every limit holds at a drive, and where the first would be crossed if it went on as it does there. */
function foretell(trajectory: Trajectory, scale: number): { holds: boolean; crossing: number } {
  const point = trajectory.solve(scale);
  if (!point) return { holds: false, crossing: 0 };
  const by = 1e-3 * scale;
  const crossings = trajectory.readers.map((reader, limit) => {
    const [value, against] = [point.values[2 * limit] as number, point.values[2 * limit + 1] as number];
    const excess = reader.excess(value, against);
    const ahead = reader.excess(
      value + by * (point.slopes[2 * limit] as number),
      against + by * (point.slopes[2 * limit + 1] as number),
    );
    const slope = (ahead - excess) / by;
    return slope > 0 ? scale - excess / slope : excess > 0 ? 0 : Infinity;
  });
  return {
    holds: trajectory.readers.every((_, limit) => trajectory.excessAt(limit, point) <= 0),
    crossing: Math.min(Infinity, ...crossings),
  };
}

/**
 * The guarded drive ceiling: the least over both correlations and the given networks (one per end of the printed-wall
 * band), with every limit tightened by the margin that the rule set asks. Never above the nominal one, since the
 * nominal network with its own limits tightened is among them.
 *
 * The first network’s ceiling is found by a whole scan. The others differ from it by little: those that hold at the least ceiling so far
 * cannot bind, and of those that do not the one foretold to be crossed first is searched just below it.
 *
 * @param networks the nominal one first
 * @param near the nominal network solved at the present drive, to start from
 */
export function guardedCeiling(
  networks: readonly NetworkDocument[],
  limits: readonly LimitInfo[],
  drive: Drive,
  near?: PreparedNetwork,
): CeilingAnswer {
  const [nominal, ...others] = networks.flatMap((network) => {
    const guarded = withAskedMargins(network, limits);
    return [guarded, withSecondCorrelations(guarded)];
  }) as [NetworkDocument, ...NetworkDocument[]];
  const first = new Trajectory(nominal, drive, near);
  let least = ceilingAlong(first, drive, true);
  if (least.status !== 'found' || least.scale === 0) {
    const rest = others.map((document) => findCeiling(document, drive, { onlyBinding: true }));
    return rest.reduce((a, b) => (comparableScale(b) < comparableScale(a) ? b : a), least);
  }
  let candidates = others.map((document) => new Trajectory(document, drive, first.network));
  for (;;) {
    const { scale } = least;
    const told = candidates.map((trajectory) => ({ trajectory, ...foretell(trajectory, scale) }));
    const broken = told.filter(({ holds }) => !holds).sort((a, b) => a.crossing - b.crossing);
    const worst = broken[0];
    if (!worst) return least;
    const ceiling =
      ceilingBelow(worst.trajectory, drive, scale) ??
      findCeiling(worst.trajectory.network.document, drive, { onlyBinding: true });
    if (comparableScale(ceiling) < comparableScale(least)) least = ceiling;
    if (least.status !== 'found' || least.scale === 0) return least;
    candidates = broken.slice(1).map(({ trajectory }) => trajectory);
  }
}
