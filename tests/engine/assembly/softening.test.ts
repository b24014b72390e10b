import { describe, expect, it } from 'vitest';
import { softeningOf } from '../../../server/engine/assembly/softening.js';
import { entered, petg } from '../fixtures.js';

describe('The softening temperature', () => {
  it('of an amorphous polymer is the lower of glass transition and heat deflection at its load', () => {
    expect(softeningOf(petg, 'self-weight')?.temperatureC).toBe(70);
    expect(softeningOf(petg, 'screw-clamped')?.temperatureC).toBe(66);
    expect(softeningOf({ ...petg, glassTransitionC: entered(60) }, 'screw-clamped')?.temperatureC).toBe(60);
  });

  it('of a semi-crystalline polymer is never its glass transition', () => {
    const nylon = {
      ...petg,
      morphology: 'semi-crystalline' as const,
      glassTransitionC: entered(45),
      longTermServiceC: entered(90),
    };
    expect(softeningOf(nylon, 'free')?.temperatureC).toBe(90);
    expect(softeningOf(nylon, 'structural')?.temperatureC).toBe(66);
    expect(
      softeningOf({ ...nylon, heatDeflection180C: undefined, longTermServiceC: undefined }, 'structural'),
    ).toBeNull();
  });

  it('of an elastomer is the data sheet’s service value only', () => {
    const rubber = { ...petg, morphology: 'elastomer' as const };
    expect(softeningOf(rubber, 'free')).toBeNull();
    expect(softeningOf({ ...rubber, longTermServiceC: entered(80) }, 'free')?.temperatureC).toBe(80);
  });
});
