import type { CeilingAnswer, Drive } from '../../../shared/schemas/network-answers.js';
import type { NetworkDocument, NetworkLimit } from '../../../shared/schemas/network.js';
import { deviceAnswers, type LimitReader } from '../network/answer.js';
import type { PreparedNetwork } from '../network/prepared.js';
import { large, Trajectory, type Point } from './trajectory.js';

/** Multiples of the present drive that are scanned: zero, then growing by a factor up to the end of the range. */
const range: [number, number] = [0, 100];
/** Fine steps for small networks; for large ones, whose every solution is dear, coarse ones: the cubics between them know the slopes. */
const fineScan = { first: 0.01, factor: 1.4 };
const coarseScan = { first: 0.0625, factor: 2 };
/** In a large network crossings are looked for up to this multiple of the least one. */
const farEnough = 8;
/** Places between two drives where the cubics are looked at, so that a limit crossed there and back is not missed. */
const looks = 8;
/** A crossing is found to this share of itself. */
const bracket = 3e-8;
/** Crossings this near to the least one are found as exactly as that. */
const contender = 2e-3;
const mostRefinements = 40;

interface Crossing {
  limit: number;
  scale: number;
}

/** First crossing of a limit along the points known; `null` without any. */
function firstCrossing(trajectory: Trajectory, limit: number): number | null {
  const { points } = trajectory;
  for (let p = 1; p < points.length; p++) {
    const a = points[p - 1] as Point;
    const b = points[p] as Point;
    let from = a.scale;
    for (let look = 1; look <= looks; look++) {
      const to = look === looks ? b.scale : a.scale + ((b.scale - a.scale) * look) / looks;
      const excess = look === looks ? trajectory.excessAt(limit, b) : trajectory.excessBetween(limit, a, b, to);
      if (excess > 0) return bisect(from, to, (scale) => trajectory.excessBetween(limit, a, b, scale));
      from = to;
    }
  }
  return null;
}

function bisect(low: number, high: number, excess: (scale: number) => number): number {
  let a = low;
  let b = high;
  for (let i = 0; i < 60 && b - a > 1e-12 * b; i++) {
    const middle = (a + b) / 2;
    if (excess(middle) > 0) b = middle;
    else a = middle;
  }
  return a;
}

/**
 * Finds a crossing exactly: solves where the cubic says it is, which makes the cubic better there, until two solved drives hold it between them
 * within the bracket. Returns the lower, at which the limit holds; `null` where there is no steady state up to it.
 */
function refine(trajectory: Trajectory, limit: number): number | null {
  for (let i = 0; i < mostRefinements; i++) {
    const scale = firstCrossing(trajectory, limit);
    if (scale === null) return null;
    const { points } = trajectory;
    const next = points.findIndex((point) => point.scale > scale);
    const above = points[next];
    const below = points[next - 1];
    if (!above || !below) return null;
    if (above.scale - below.scale <= bracket * above.scale && trajectory.excessAt(limit, above) > 0) return below.scale;
    // Once near, step to just beyond it on the side that is still open, so that the bracket closes.
    const near = 0.4 * bracket * above.scale;
    const open = scale - below.scale > above.scale - scale ? -near : near;
    const closing = Math.min(scale - below.scale, above.scale - scale) < 1e-3 * (above.scale - below.scale);
    const tryAt = Math.min(Math.max(scale + (closing ? open : 0), below.scale + near / 2), above.scale - near / 2);
    if (!trajectory.solve(tryAt)) return null;
  }
  return firstCrossing(trajectory, limit);
}

/** Highest scale with a steady state, between one that has it and one that has not. */
function runawayScale(trajectory: Trajectory, holds: number, fails: number): number {
  let low = holds;
  let high = fails;
  while (high - low > 1e-5 * high) {
    const middle = (low + high) / 2;
    if (trajectory.solve(middle)) low = middle;
    else high = middle;
  }
  return low;
}

function hottestSource(network: PreparedNetwork): string {
  const { nodes } = network.document;
  const kelvin = ({ id }: { id: string }) => network.temperatures[network.numberOf(id)] ?? 0;
  const [first, ...rest] = nodes;
  if (!first) return '';
  return rest.reduce((best, node) => {
    const better = (node.source ? 1 : 0) - (best.source ? 1 : 0);
    return better > 0 || (better === 0 && kelvin(node) > kelvin(best)) ? node : best;
  }, first).id;
}

/** Solves along the drive until every limit asked for has been crossed, or there is no steady state any more. */
function scan(
  trajectory: Trajectory,
  onlyBinding: boolean,
): { last: number; runaway?: NonNullable<CeilingAnswer['runaway']> } {
  const { readers, network } = trajectory;
  const steps = network.unknownCount <= large ? fineScan : coarseScan;
  const open = new Set(readers.keys());
  let last = 0;
  let least = Infinity;
  for (let scale = steps.first; ; scale = Math.min(scale * steps.factor, range[1])) {
    const point = trajectory.solve(scale);
    if (!point) {
      const highest = runawayScale(trajectory, last, scale);
      trajectory.settle(highest);
      return { last: highest, runaway: { scale: highest, node: hottestSource(network) } };
    }
    last = scale;
    for (const limit of open) if (trajectory.excessAt(limit, point) > 0) open.delete(limit);
    const crossed = readers.length - open.size;
    if (crossed > 0) least = Math.min(least, scale);
    if (steps === coarseScan && scale >= farEnough * least) return { last };
    // Without any limit the scan goes on for a runaway.
    if (scale >= range[1] || (readers.length > 0 && (open.size === 0 || (onlyBinding && crossed > 0)))) return { last };
  }
}

/**
 * The largest drive at which every limit holds: a scan from zero, then the first crossing found to a few parts in a hundred million.
 *
 * @param drive what is varied; the scale is a multiple of the present drive, or amperes (watts) where that is zero
 * @param options `limits`: further temperature limits; `onlyBinding`: find only the least crossing, which is faster; `near`:
 * a like network to start from
 * @returns scale, drive and power at the ceiling, what binds, and each limit’s own crossing (`null`: none within range). In a large
 * network the crossings well above the least one are read off the cubics between solved drives, to about a part in a thousand.
 * @throws EngineError for an invalid document or drive
 */
export function findCeiling(
  document: NetworkDocument,
  drive: Drive,
  options: {
    limits?: readonly { node: string; maxC: number }[] | undefined;
    onlyBinding?: boolean;
    near?: PreparedNetwork | undefined;
  } = {},
): CeilingAnswer {
  const further: NetworkLimit[] = (options.limits ?? []).map(({ node, maxC }, i) => ({
    id: `further-${String(i + 1)}`,
    node,
    maxC,
  }));
  const trajectory = new Trajectory({ ...document, limits: [...document.limits, ...further] }, drive, options.near);
  return ceilingAlong(trajectory, drive, options.onlyBinding ?? false);
}

/** The same along a trajectory of the caller’s own, which keeps the solved drives. */
export function ceilingAlong(trajectory: Trajectory, drive: Drive, onlyBinding: boolean): CeilingAnswer {
  const { network, readers } = trajectory;

  const zero = trajectory.solve(0);
  if (!zero) return atZero(trajectory, null, { scale: 0, node: hottestSource(network) });
  if (readers.some((_, limit) => trajectory.excessAt(limit, zero) > 0)) return atZero(trajectory, zero);
  const { last, runaway } = scan(trajectory, onlyBinding);

  const crossings = readers.flatMap((_, limit): Crossing[] => {
    const scale = firstCrossing(trajectory, limit);
    return scale === null ? [] : [{ limit, scale }];
  });
  const fine = network.unknownCount <= large;
  const least = () => crossings.reduce((scale, crossing) => Math.min(scale, crossing.scale), Infinity);
  // From the least on, as long as one could still be the least or all are wanted exactly.
  crossings.sort((a, b) => a.scale - b.scale);
  for (const crossing of crossings) {
    const wanted = fine && !onlyBinding ? Infinity : least() * (1 + (onlyBinding ? 1e-3 : contender));
    if (crossing.scale > wanted) continue;
    crossing.scale = refine(trajectory, crossing.limit) ?? Infinity;
  }
  const found = crossings.filter(({ scale }) => scale < Infinity);
  const binding = found.reduce<Crossing | undefined>((a, b) => (a && a.scale <= b.scale ? a : b), undefined);
  const scaleOf = new Map(found.map(({ limit, scale }) => [limit, scale]));
  const perLimit = readers.map(({ id }, limit) => ({ id, scale: scaleOf.get(limit) ?? null }));
  if (runaway && (!binding || runaway.scale < binding.scale)) {
    return {
      ...drawn(trajectory, drive, runaway.scale),
      status: 'runaway',
      binds: { kind: 'runaway', id: runaway.node, node: runaway.node },
      perLimit,
      range,
      runaway,
    };
  }
  return {
    ...drawn(trajectory, drive, binding ? binding.scale : last),
    status: binding ? 'found' : 'no-limit-within-range',
    binds: binding ? bindsOf(readers[binding.limit] as LimitReader) : null,
    perLimit,
    range,
    ...(runaway ? { runaway } : {}),
  };
}

/**
 * The ceiling of a network that breaks a limit at a drive, looked for just below it: for one that is nearly another whose ceiling is known.
 *
 * @param above a drive at which a limit is broken
 * @returns `null` where nothing holds down to a tenth of it
 */
export function ceilingBelow(trajectory: Trajectory, drive: Drive, above: number): CeilingAnswer | null {
  const { readers } = trajectory;
  const holds = (point: Point) => readers.every((_, limit) => trajectory.excessAt(limit, point) <= 0);
  if (!trajectory.points.some(({ scale }) => scale === above) && !trajectory.solve(above)) return null;
  let low = above;
  let point: Point | null;
  do {
    low *= 0.9;
    point = trajectory.solve(low);
  } while (point && !holds(point) && low > 0.1 * above);
  if (!point || !holds(point)) return null;
  const crossings = readers.flatMap((_, limit): Crossing[] => {
    const scale = firstCrossing(trajectory, limit);
    return scale === null ? [] : [{ limit, scale }];
  });
  crossings.sort((a, b) => a.scale - b.scale);
  let best: Crossing | null = null;
  for (const crossing of crossings) {
    if (best && crossing.scale > best.scale * 1.001) break;
    const scale = refine(trajectory, crossing.limit);
    if (scale !== null && (!best || scale < best.scale)) best = { limit: crossing.limit, scale };
  }
  if (!best) return null;
  const { limit, scale } = best;
  return {
    ...drawn(trajectory, drive, scale),
    status: 'found',
    binds: bindsOf(readers[limit] as LimitReader),
    perLimit: readers.map(({ id }, i) => ({ id, scale: i === limit ? scale : null })),
    range,
  };
}

function bindsOf(reader: LimitReader): NonNullable<CeilingAnswer['binds']> {
  return { kind: reader.kind, id: reader.id, ...(reader.node === undefined ? {} : { node: reader.node }) };
}

function atZero(trajectory: Trajectory, zero: Point | null, runaway?: CeilingAnswer['runaway']): CeilingAnswer {
  const { readers, network } = trajectory;
  const isExceeded = (limit: number) => zero !== null && trajectory.excessAt(limit, zero) > 0;
  const exceeded = readers.find((_, limit) => isExceeded(limit));
  return {
    status: 'exceeded-at-zero',
    scale: 0,
    electricalW: 0,
    heatW: network.sources.heat.reduce((sum, heat) => sum + heat, 0),
    binds: exceeded ? bindsOf(exceeded) : { kind: 'runaway', id: runaway?.node ?? '', node: runaway?.node },
    perLimit: readers.map(({ id }, limit) => ({ id, scale: isExceeded(limit) ? 0 : null })),
    range,
    ...(runaway ? { runaway } : {}),
  };
}

/** Drive and power at a scale: electrical at the devices’ terminals and given heats, and all that becomes heat. */
function drawn(trajectory: Trajectory, drive: Drive, scale: number) {
  trajectory.settle(scale);
  const { network } = trajectory;
  const devices = Object.values(deviceAnswers(network, true));
  const given = network.sources.givenHeat.reduce((sum, heat) => sum + heat, 0);
  const electricalW = devices.reduce((sum, device) => sum + (device.electricalW ?? device.heatW), given);
  const heatW = network.sources.heat.reduce((sum, heat) => sum + heat, 0);
  const index = 'supply' in drive ? network.document.supplies.findIndex(({ id }) => id === drive.supply) : -1;
  return {
    scale,
    ...(index >= 0 ? { currentA: network.sources.supplyCurrents[index] ?? 0 } : {}),
    electricalW,
    heatW,
  };
}
