import type { CeilingAnswer, Drive } from '../../../shared/schemas/network-answers.js';
import type { NetworkDocument, NetworkLimit } from '../../../shared/schemas/network.js';
import { EngineError } from '../errors.js';
import { deviceAnswers, limitReader, type LimitReader } from '../network/answer.js';
import { firstGuess, solveSteady } from '../network/newton.js';
import { PreparedNetwork } from '../network/prepared.js';

/** Multiples of the present drive that are scanned: zero, then growing by this factor up to the end of the range. */
const range: [number, number] = [0, 100];
const firstScan = 0.01;
const scanFactor = 1.4;
/** A crossing is bracketed to this share of itself. */
const bracket = 1e-7;
const mostRefinements = 60;

/** A network whose drive can be set to any multiple of the present one. */
class DrivenNetwork {
  readonly network: PreparedNetwork;
  private readonly setDrive: (scale: number) => void;
  /** Temperatures of the last solved drive, to start the next from. */
  private readonly warm: Float64Array;

  constructor(document: NetworkDocument, drive: Drive) {
    this.network = new PreparedNetwork(document);
    this.setDrive = driveSetter(this.network, drive);
    this.warm = Float64Array.from(this.network.temperatures);
    this.setDrive(0);
    firstGuess(this.network);
    this.warm.set(this.network.temperatures);
  }

  /** Solves at a multiple of the present drive; false where there is no steady state. */
  solve(scale: number): boolean {
    this.setDrive(scale);
    this.network.temperatures.set(this.warm);
    try {
      solveSteady(this.network);
    } catch (error) {
      if (
        error instanceof EngineError &&
        (error.code === 'runaway' || error.code === 'not-converged' || error.code === 'outside-range')
      )
        return false;
      throw error;
    }
    this.warm.set(this.network.temperatures);
    return true;
  }
}

/**
 * What “× scale” means: the supply’s current, or of each named source its given heat, its current (its supply’s, where it has
 * one) and its output power. Where the present drive is zero the scale counts in amperes or watts.
 */
function driveSetter(network: PreparedNetwork, drive: Drive): (scale: number) => void {
  const { document, sources } = network;
  if ('supply' in drive) {
    const index = document.supplies.findIndex(({ id }) => id === drive.supply);
    const supply = document.supplies[index];
    if (!supply) {
      const message = `There is no supply “${drive.supply}”`;
      throw new EngineError('unknown-reference', message, [{ path: '/drive/supply', message }]);
    }
    const base = supply.currentA > 0 ? supply.currentA : 1;
    return (scale) => {
      sources.supplyCurrents[index] = base * scale;
    };
  }
  const setters = drive.sources.map((id, i) => {
    const node = document.nodes.find((candidate) => candidate.id === id);
    const path = `/drive/sources/${String(i)}`;
    if (!node || node.fixedC !== undefined) {
      const message = node ? `“${id}” has a fixed temperature and makes no heat` : `There is no node “${id}”`;
      throw new EngineError('unknown-reference', message, [{ path, message, node: id }]);
    }
    const n = network.numberOf(id);
    const { source, heatW } = node;
    const supply = source?.supply === undefined ? -1 : document.supplies.findIndex((s) => s.id === source.supply);
    const supplyA = document.supplies[supply]?.currentA ?? 0;
    const ownA = source && source.kind !== 'converter' && supply < 0 ? (source.currentA ?? 0) : undefined;
    const outputW = source?.kind === 'converter' ? source.outputW : undefined;
    // Only a bare node is driven by heat alone, and only there a zero means watts.
    const baseHeat = source ? heatW : heatW === undefined || heatW === 0 ? 1 : heatW;
    return (scale: number) => {
      if (baseHeat !== undefined) sources.givenHeat[n] = baseHeat * scale;
      if (supply >= 0) sources.supplyCurrents[supply] = (supplyA > 0 ? supplyA : 1) * scale;
      if (ownA !== undefined) sources.ownCurrents[n] = (ownA > 0 ? ownA : 1) * scale;
      if (outputW !== undefined) sources.outputs[n] = (outputW > 0 ? outputW : 1) * scale;
    };
  });
  return (scale) => {
    for (const set of setters) set(scale);
  };
}

interface Crossing {
  reader: LimitReader;
  /** Scale below which the limit holds, and the excess there; the same above. `high` is infinite until it has been crossed. */
  low: number;
  lowExcess: number;
  high: number;
  highExcess: number;
}

/** Narrows all brackets by what the network says at one scale. */
function record(crossings: readonly Crossing[], scale: number): void {
  for (const crossing of crossings) {
    if (scale <= crossing.low || scale >= crossing.high) continue;
    const excess = crossing.reader.excess();
    if (excess > 0) {
      crossing.high = scale;
      crossing.highExcess = excess;
    } else {
      crossing.low = scale;
      crossing.lowExcess = excess;
    }
  }
}

/** Next scale to try in a bracket: where the chord crosses zero, with a bisection whenever the last try kept the same end. */
function refine(driven: DrivenNetwork, crossings: readonly Crossing[], target: Crossing): void {
  let side = 0;
  let lowWeight = target.lowExcess;
  let highWeight = target.highExcess;
  for (let i = 0; i < mostRefinements; i++) {
    const { low, high } = target;
    if (high - low <= bracket * high) return;
    const chord = low + ((high - low) * -lowWeight) / (highWeight - lowWeight);
    // A step just past the chord’s crossing closes the bracket from the other side.
    const edge = Math.max(bracket * high * 0.3, (high - low) * 1e-3);
    const tryAt = i % 8 === 7 ? (low + high) / 2 : Math.min(Math.max(chord, low + edge), high - edge);
    // No steady state here: that is a runaway below this crossing, and what the limit would be is not known.
    if (!driven.solve(tryAt)) {
      target.high = Infinity;
      return;
    }
    const before = target.low;
    record(crossings, tryAt);
    // Illinois: halve the weight of an end that stays.
    if (target.low > before) {
      lowWeight = target.lowExcess;
      highWeight = side === 1 ? highWeight / 2 : target.highExcess;
      side = 1;
    } else {
      highWeight = target.highExcess;
      lowWeight = side === -1 ? lowWeight / 2 : target.lowExcess;
      side = -1;
    }
  }
}

/** Highest scale with a steady state, between one that has it and one that has not. */
function runawayScale(driven: DrivenNetwork, crossings: readonly Crossing[], holds: number, fails: number): number {
  let low = holds;
  let high = fails;
  while (high - low > 1e-5 * high) {
    const middle = (low + high) / 2;
    if (driven.solve(middle)) {
      low = middle;
      record(crossings, middle);
    } else high = middle;
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

/**
 * The largest drive at which every limit holds: a scan from zero, then each first crossing bracketed to a part in ten million.
 *
 * @param drive what is varied; the scale is a multiple of the present drive, or amperes (watts) where that is zero
 * @param options `limits`: further temperature limits; `onlyBinding`: bracket only the least crossing, which is faster
 * @returns scale, drive and power at the ceiling, what binds, and each limit’s own crossing (`null`: none within range)
 * @throws EngineError for an invalid document or drive
 */
export function findCeiling(
  document: NetworkDocument,
  drive: Drive,
  options: { limits?: readonly { node: string; maxC: number }[] | undefined; onlyBinding?: boolean } = {},
): CeilingAnswer {
  const further: NetworkLimit[] = (options.limits ?? []).map(({ node, maxC }, i) => ({
    id: `further-${String(i + 1)}`,
    node,
    maxC,
  }));
  const driven = new DrivenNetwork({ ...document, limits: [...document.limits, ...further] }, drive);
  const { network } = driven;
  const crossings: Crossing[] = network.document.limits.map((limit) => ({
    reader: limitReader(network, limit),
    low: -1,
    lowExcess: 0,
    high: Infinity,
    highExcess: 0,
  }));

  let runaway: CeilingAnswer['runaway'];
  let last = 0;
  for (let scale = 0; ; scale = scale === 0 ? firstScan : Math.min(scale * scanFactor, range[1])) {
    if (!driven.solve(scale)) {
      if (scale === 0) return atZero(driven, crossings, { scale: 0, node: hottestSource(network) });
      const highest = runawayScale(driven, crossings, last, scale);
      driven.solve(highest);
      runaway = { scale: highest, node: hottestSource(network) };
      break;
    }
    record(crossings, scale);
    if (crossings.some(({ high }) => high === 0)) return atZero(driven, crossings);
    last = scale;
    // Without any limit the scan goes on for a runaway.
    const open = crossings.length === 0 || crossings.some(({ high }) => high === Infinity);
    if (scale >= range[1] || !open || (options.onlyBinding && crossings.some(({ high }) => high < Infinity))) break;
  }

  const crossed = crossings.filter(({ high }) => high < Infinity);
  if (options.onlyBinding) {
    // Only those whose bracket reaches below the least upper end can bind.
    for (;;) {
      const least = crossed.reduce<Crossing | undefined>(
        (a, b) => (a === undefined || b.high < a.high ? b : a),
        undefined,
      );
      if (!least || least.high - least.low <= bracket * least.high) break;
      refine(driven, crossed, least);
      if (crossed.every((c) => c.high >= least.high)) break;
    }
  } else {
    for (const crossing of crossed) refine(driven, crossed, crossing);
  }

  const binding = crossed.reduce<Crossing | undefined>(
    (a, b) => (a === undefined || b.high < a.high ? b : a),
    undefined,
  );
  const perLimit = crossings.map(({ reader, high, low }) => ({ id: reader.id, scale: high < Infinity ? low : null }));
  if (runaway && (!binding || runaway.scale < binding.low)) {
    return {
      ...drawn(driven, drive, runaway.scale),
      status: 'runaway',
      binds: { kind: 'runaway', id: runaway.node, node: runaway.node },
      perLimit,
      range,
      runaway,
    };
  }
  const scale = binding ? Math.max(binding.low, 0) : last;
  return {
    ...drawn(driven, drive, scale),
    status: binding ? 'found' : 'no-limit-within-range',
    binds: binding ? bindsOf(binding.reader) : null,
    perLimit,
    range,
    ...(runaway ? { runaway } : {}),
  };
}

function bindsOf(reader: LimitReader): NonNullable<CeilingAnswer['binds']> {
  return { kind: reader.kind, id: reader.id, ...(reader.node === undefined ? {} : { node: reader.node }) };
}

function atZero(
  driven: DrivenNetwork,
  crossings: readonly Crossing[],
  runaway?: CeilingAnswer['runaway'],
): CeilingAnswer {
  const exceeded = crossings.find(({ high }) => high === 0);
  return {
    status: 'exceeded-at-zero',
    scale: 0,
    electricalW: 0,
    heatW: driven.network.sources.heat.reduce((sum, heat) => sum + heat, 0),
    binds: exceeded ? bindsOf(exceeded.reader) : { kind: 'runaway', id: runaway?.node ?? '', node: runaway?.node },
    perLimit: crossings.map(({ reader, high }) => ({ id: reader.id, scale: high === 0 ? 0 : null })),
    range,
    ...(runaway ? { runaway } : {}),
  };
}

/** Drive and power at a scale: electrical at the devices’ terminals and given heats, and all that becomes heat. */
function drawn(driven: DrivenNetwork, drive: Drive, scale: number) {
  driven.solve(scale);
  const { network } = driven;
  const devices = Object.values(deviceAnswers(network, true));
  const given = network.sources.givenHeat.reduce((sum, heat) => sum + heat, 0);
  const electricalW = devices.reduce((sum, device) => sum + (device.electricalW ?? device.heatW), given);
  const heatW = network.sources.heat.reduce((sum, heat) => sum + heat, 0);
  const index = 'supply' in drive ? network.document.supplies.findIndex(({ id }) => id === drive.supply) : -1;
  return { scale, ...(index >= 0 ? { currentA: network.sources.supplyCurrents[index] ?? 0 } : {}), electricalW, heatW };
}
