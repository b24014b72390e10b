import { mount } from '@vue/test-utils';
import { describe, expect, test } from 'vitest';
import { faceNames } from '../../../shared/schemas/assembly.js';
import { estimateAssembly } from '../../../server/engine/answers/estimate.js';
import { completeDraft } from '../../../src/composables/complete-draft.js';
import { figuresBelow, percentBelow } from '../../../src/composables/numbers.js';
import { cutaway } from '../../../src/components/pictures/cutaway.js';
import CutawayPicture from '../../../src/components/pictures/CutawayPicture.vue';
import { netLayout } from '../../../src/components/pictures/net-layout.js';
import { staircase } from '../../../src/components/pictures/staircase.js';
import StaircasePicture from '../../../src/components/pictures/StaircasePicture.vue';
import { temperatureColour } from '../../../src/components/pictures/temperature-scale.js';
import { marginShares } from '../../../src/components/sheet/margin-bar.js';
import { nodeWorking } from '../../../src/components/sheet/node-working.js';
import { verdictFacts, worstScenario } from '../../../src/components/sheet/verdict-facts.js';
import { lamp, lampInput, rules } from '../../engine/fixtures.js';

const estimate = estimateAssembly(lamp(), rules);
const path = estimate.paths[0];
if (!path) throw new Error('the lamp has parts');

describe('the working of a temperature', () => {
  test('balances: what comes in leaves again, at every place that is not given', () => {
    for (const { id } of estimate.nodes) {
      const working = nodeWorking(estimate, id);
      if (!working) throw new Error(id);
      if (working.fixed) continue;
      // Flows below the least that is shown are left out of the rows: 0.05 mW each.
      expect(Math.abs(working.inW - working.outW)).toBeLessThan(2e-3);
    }
  });

  test('of a hottest spot is the balance of what it is read from', () => {
    const spot = nodeWorking(estimate, 'face.top.hotSpot');
    expect(spot?.balanceOf).toBe(estimate.nodes.find(({ id }) => id === 'face.top.outer')?.label);
    expect(spot?.rows.length).toBeGreaterThan(1);
    expect(nodeWorking(estimate, 'carrier.plate.peak.left')?.balanceOf).toBe('Plate, mean');
  });

  test('names the law and its inputs for each way of the heat', () => {
    const working = nodeWorking(estimate, 'face.top.outer');
    const laws = working?.rows.map(({ law }) => law) ?? [];
    expect(laws).toContain('Convection of its bare side, plate facing up, cell by cell');
    expect(laws).toContain('Radiation of its bare side, cell by cell');
    expect(laws).toContain('Conduction through the wall');
    const front = nodeWorking(estimate, 'face.front.outer')?.rows.map(({ law }) => law) ?? [];
    expect(front).toEqual(expect.arrayContaining(['Natural convection, upright plate', 'Radiation', 'Conduction']));
    expect(nodeWorking(estimate, 'no.such.place')).toBeNull();
  });
});

describe('the verdict strip', () => {
  test('speaks of the must-hold scenario with least headroom', () => {
    expect(worstScenario(estimate.scenarios)?.scenario).toBe('hot');
    const optional = estimate.scenarios.map((entry) => ({ ...entry, mustHold: entry.scenario === 'room' }));
    expect(worstScenario(optional)?.scenario).toBe('room');
  });

  test('never rounds a ceiling up or a headroom up', () => {
    expect(figuresBelow(0.38999)).toBe('0.389');
    expect(figuresBelow(0.128)).toBe('0.128');
    expect(figuresBelow(12.39)).toBe('12.3');
    expect(percentBelow(0.0699)).toBe('+6\u00a0%');
    expect(percentBelow(-0.001)).toBe('−1\u00a0%');
  });

  test('says how far the drive is over the guarded ceiling', () => {
    const facts = verdictFacts(estimate);
    expect(facts?.state).toBe('exceeds');
    expect(facts?.overGuarded).toBe(true);
    expect(facts?.headroom.startsWith('−')).toBe(true);
    expect(facts?.binds).toBe('Top face softens');
  });

  test('a bar is full at the limit and half way half full', () => {
    const limit = estimate.limits.find(({ kind }) => kind === 'temperature');
    if (!limit) throw new Error('no temperature limit');
    const at = (value: number) => marginShares({ ...limit, limit: 100, value, askedMargin: 10 }, 20);
    expect(at(100).used).toBeCloseTo(1, 12);
    expect(at(60).used).toBeCloseTo(0.5, 12);
    expect(at(60).asked).toBeCloseTo(10 / 80, 12);
  });
});

describe('the pictures', () => {
  test.each([200, 340, 560, 1000])('the net of faces fits into %i px, and no two faces overlap', (width) => {
    for (const outerM of [
      [0.16, 0.09, 0.045],
      [0.5, 0.02, 0.02],
      [0.02, 0.02, 0.5],
      ['?', null, 0.1] as unknown as number[],
    ]) {
      const layout = netLayout(outerM, width);
      expect(layout.width).toBeLessThanOrEqual(Math.max(width, 142));
      const rects = faceNames.map((face) => layout.faces[face]);
      rects.forEach((a, i) => {
        for (const b of rects.slice(i + 1)) {
          const apart = a.x + a.w <= b.x || b.x + b.w <= a.x || a.y + a.h <= b.y || b.y + b.h <= a.y;
          expect(apart).toBe(true);
        }
      });
    }
  });

  test('the staircase goes down from step to step, inside its frame', () => {
    for (const width of [320, 520]) {
      const drawing = staircase(path, width, 300);
      drawing.steps.forEach((step, i) => {
        const next = drawing.steps[i + 1];
        if (next) expect(next.y).toBeGreaterThanOrEqual(step.y - 1e-9);
        expect(step.y).toBeGreaterThan(0);
        expect(step.y).toBeLessThanOrEqual(drawing.floor + 1e-9);
        if (step.limitY !== null) expect(step.limitY).toBeLessThanOrEqual(drawing.floor);
      });
    }
  });

  test('every step and every drawn block is a button with a name', async () => {
    const stairs = mount(StaircasePicture, { props: { path, partName: 'Left' } });
    const steps = stairs.findAll('[role=button]');
    expect(steps.length).toBe(path.steps.length);
    await steps[0]?.trigger('keydown', { key: 'Enter' });
    expect(stairs.emitted('working')).toEqual([[path.steps[0]?.node]]);
    const section = mount(CutawayPicture, { props: { estimate, document: lampInput } });
    for (const block of section.findAll('[role=button]')) expect(block.attributes('aria-label')).toMatch(/degrees/);
  });

  test('the cutaway draws each part inside the walls, with heat leaving upwards', () => {
    const drawing = cutaway(lampInput, estimate, 520);
    expect(drawing.parts.length).toBe(2);
    for (const part of drawing.parts) {
      expect(part.x).toBeGreaterThan(drawing.outer.x);
      expect(part.x + part.w).toBeLessThan(drawing.outer.x + drawing.outer.w);
      expect(part.y).toBeGreaterThan(drawing.outer.y);
    }
    expect(drawing.arrows.find(({ face }) => face === 'top')?.direction).toBe('up');
  });

  test('the temperature scale runs from slate-blue to straw', () => {
    const range = { low: 20, high: 80 };
    expect(temperatureColour(20, range)).toBe('rgb(43 58 85)');
    expect(temperatureColour(80, range)).toBe('rgb(246 217 139)');
    expect(temperatureColour(1000, range)).toBe('rgb(246 217 139)');
  });
});

describe('an unfinished draft', () => {
  test.each([{}, { name: 5 }, { housing: 7, parts: 'x' }, { housing: { faces: { top: 3 } }, carriers: [null] }])(
    'gets the frame of a sheet, whatever it holds: %j',
    (draft) => {
      const document = completeDraft(draft);
      expect(Object.keys(document.housing?.faces ?? {})).toHaveLength(6);
      expect(Array.isArray(document.parts)).toBe(true);
      expect(document.housing?.outerM).toHaveLength(3);
    },
  );

  test('an open assembly stays without a housing, its carriers without a wall', () => {
    const document = completeDraft({ housing: null, carriers: [{ id: 'plate', kind: 'plate' }] });
    expect(document.housing).toBeNull();
    expect(document.carriers?.[0]?.on).toBeNull();
  });

  test('a finished one is left as it is', () => {
    expect(completeDraft(lamp())).toMatchObject(JSON.parse(JSON.stringify(lamp())) as object);
  });
});
