import { describe, expect, it } from 'vitest';
import { assemblyDocumentSchema, faceNames } from '../../../shared/schemas/assembly.js';
import { resolveAssembly } from '../../../server/engine/assembly/resolve.js';
import { EngineError } from '../../../server/engine/errors.js';
import { lamp, lampHousing, lampInput, printedWall, sixWalls } from '../fixtures.js';

function refusal(document: Parameters<typeof resolveAssembly>[0]): { path: string; message: string }[] {
  try {
    resolveAssembly(document);
  } catch (error) {
    if (error instanceof EngineError) return error.errors;
    throw error;
  }
  throw new Error('It was not refused');
}

describe('Checking an assembly', () => {
  it('accepts the lamp and assumes nothing, since all is known', () => {
    expect(resolveAssembly(lamp()).assumptions).toEqual([]);
  });

  it('refuses a part on a face or carrier that is not there, at its field', () => {
    const parts = lampInput.parts.map((part) => ({ ...part, mount: { ...part.mount, on: 'face.lid' } }));
    expect(refusal(lamp({ parts }))[0]).toEqual({
      path: '/parts/0/mount/on',
      message: 'There is no carrier or face “face.lid” to stand on',
    });
  });

  it('refuses an array without a supply', () => {
    const parts = lampInput.parts.map((part) => ({ ...part, supply: null }));
    expect(refusal(lamp({ parts }))[0]?.path).toBe('/parts/0/supply');
  });

  it('refuses walls that leave no room', () => {
    const faces = sixWalls({ ...printedWall, wallM: 0.05 });
    expect(refusal(lamp({ housing: { ...lampHousing, faces } }))[0]?.path).toBe('/housing/outerM/1');
  });

  it('refuses a plate larger than its face, and parts that need more than their plate', () => {
    const plate = lampInput.carriers?.[0];
    if (plate?.kind !== 'plate') throw new Error('no plate');
    expect(refusal(lamp({ carriers: [{ ...plate, sizeM: [0.2, 0.07] }] }))[0]?.path).toBe('/carriers/0/sizeM');
    expect(refusal(lamp({ carriers: [{ ...plate, sizeM: [0.01, 0.01] }] }))[0]?.path).toBe('/parts/0/mount/on');
    const parts = lampInput.parts.map((part) => ({ ...part, mount: { on: 'plate', stack: [] } }));
    expect(refusal(lamp({ carriers: [{ ...plate, sizeM: [0.021, 0.021] }], parts }))[0]?.path).toBe(
      '/parts/1/mount/on',
    );
  });

  it('refuses parts over each other or over the edge, at their position', () => {
    const at = (xM: number) =>
      lampInput.parts.map((part, i) => ({ ...part, mount: { ...part.mount, xM: i ? xM : 0.03 } }));
    expect(refusal(lamp({ parts: at(0.035) }))[0]).toEqual({
      path: '/parts/1/mount/xM',
      message: 'right lies over left',
    });
    expect(refusal(lamp({ parts: at(0.118) }))[0]).toEqual({
      path: '/parts/1/mount/xM',
      message: 'right hangs over the edge of “plate”',
    });
  });

  it('spreads parts of unknown position evenly, and says so', () => {
    const parts = lampInput.parts.map((part) => ({ ...part, mount: { ...part.mount, xM: null, yM: null } }));
    const resolved = resolveAssembly(lamp({ parts }));
    expect(resolved.parts.map(({ at }) => at.xM + at.sizeM[0] / 2)).toEqual([
      expect.closeTo(0.03, 9) as number,
      expect.closeTo(0.09, 9) as number,
    ]);
    expect(resolved.assumptions.map(({ key }) => key)).toEqual(['positions']);
  });

  it('refuses two parts of one id, and a drive that is not there', () => {
    const [first] = lampInput.parts;
    if (!first) throw new Error('no part');
    expect(refusal(lamp({ parts: [first, first] }))[0]?.path).toBe('/parts/1/id');
    expect(refusal(lamp({ drive: { supply: 'other' } }))[0]?.path).toBe('/drive/supply');
  });

  it('names every error at once', () => {
    const parts = lampInput.parts.map((part) => ({ ...part, supply: 'none', mount: { ...part.mount, on: 'nowhere' } }));
    expect(refusal(lamp({ parts })).map(({ path }) => path)).toEqual([
      '/parts/0/supply',
      '/parts/0/mount/on',
      '/parts/1/supply',
      '/parts/1/mount/on',
    ]);
  });
});

describe('Not knowing', () => {
  const unknown = assemblyDocumentSchema.parse({
    ...lampInput,
    housing: {
      ...lampHousing,
      touched: null,
      faces: sixWalls({ wallM: null, material: null, finishOutside: null, finishInside: null, print: null }),
    },
    carriers: [],
    parts: [{ id: 'left', type: lampInput.parts[0]?.type, mount: { on: 'face.top', stack: null }, supply: 'drive' }],
    scenarios: [{ id: 'room', name: 'Room', airC: null }],
  });

  it('takes the cautious default and lists each once, with all its fields', () => {
    const { assumptions, box } = resolveAssembly(unknown);
    const wall = assumptions.find(({ key }) => key === 'wallM');
    expect(wall?.paths).toEqual(faceNames.map((name) => `/housing/faces/${name}/wallM`));
    expect(box?.faces.top.wallM).toBe(wall?.value);
    expect(assumptions.map(({ key }) => key)).toEqual(
      expect.arrayContaining(['material', 'loadState', 'touched', 'jointPrinted', 'lightKeptShare', 'airC']),
    );
  });

  it('takes the typical value for the one that is asked about, and only that', () => {
    const { box, scenarios } = resolveAssembly(unknown, new Set(['wallM']));
    expect(box?.faces.top.wallM).toBe(0.002);
    expect(scenarios[0]?.airC).toBe(40);
  });

  it('never takes a joint for perfect', () => {
    expect(resolveAssembly(unknown).parts[0]?.jointKM2PerW).toBe(5e-4);
  });
});
