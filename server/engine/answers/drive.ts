import type { Drive } from '../../../shared/schemas/network-answers.js';
import { EngineError } from '../errors.js';
import type { PreparedNetwork } from '../network/prepared.js';

/**
 * What “× scale” means: the supply’s current, or of each named source its given heat, its current (its supply’s, where it has
 * one) and its output power. Where the present drive is zero the scale counts in amperes or watts.
 *
 * @throws EngineError where the drive names what is not there
 */
export function driveSetter(network: PreparedNetwork, drive: Drive): (scale: number) => void {
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
