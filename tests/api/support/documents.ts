import type { AssemblyDocument } from '../../../shared/schemas/assembly.js';
import { readDemo } from '../../data/files.js';

/** Any JSON, for tests that spoil one place of it. */
export type Json = Record<string, unknown>;

/** A demo document with every value in place, as plain JSON that a test may change. */
export function demoDocument(name: 'stall-lantern' | 'driver-box' | 'load-box' = 'load-box', named?: string): Json {
  const document: AssemblyDocument = readDemo(name);
  const plain = JSON.parse(JSON.stringify(document)) as Json;
  return named === undefined ? plain : { ...plain, name: named };
}

/** A copy with another value at a JSON pointer; `undefined` takes the field out. */
export function changed(document: unknown, pointer: string, value: unknown): Json {
  const copy = structuredClone(document) as Json;
  const steps = pointer.split('/').slice(1);
  const last = steps.pop() ?? '';
  let place: Json = copy;
  for (const step of steps) place = place[step] as Json;
  if (value === undefined) Reflect.deleteProperty(place, last);
  else place[last] = value;
  return copy;
}

/** A heater on a rod to a room: 10 W over 2 K/W stands 20 K above 25 °C. */
export function rodNetwork(): Json {
  return {
    format: 'trimwick-network/1',
    nodes: [
      { id: 'heater', heatW: 10 },
      { id: 'room', fixedC: 25 },
    ],
    links: [{ id: 'rod', kind: 'resistance', from: 'heater', to: 'room', resistanceKPerW: 2 }],
    limits: [{ id: 'top', node: 'heater', maxC: 65 }],
  };
}
