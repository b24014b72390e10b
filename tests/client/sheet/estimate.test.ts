import { effectScope, shallowRef, type EffectScope } from 'vue';
import { afterEach, beforeEach, describe, expect, test, vi } from 'vitest';
import type { AssemblyDocument } from '../../../shared/schemas/assembly.js';
import type { Estimate } from '../../../shared/schemas/estimate.js';
import { emptyAnswers, firstAssembly } from '../../../shared/first-assembly.js';
import { useEstimate, type EstimateFailure } from '../../../src/composables/useEstimate.js';

function documentNamed(name: string): AssemblyDocument {
  return { ...firstAssembly(emptyAnswers(), { materials: [], partTypes: [] }).document, name };
}

/** An answer is told apart by its engine version only; the composable never looks inside. */
const answerTo = (name: string) => ({ engineVersion: name }) as Estimate;
const broken: EstimateFailure = { kind: 'connection', message: 'no connection', errors: [] };

let scope: EffectScope;

function setUp(document = shallowRef<unknown>(documentNamed('one'))) {
  const asked: { name: string; signal: AbortSignal; answer: (estimate: Estimate) => void; fail: () => void }[] = [];
  const live = scope.run(() =>
    useEstimate({
      document,
      request: (assembly, _scenario, signal) =>
        new Promise((resolve, reject) => {
          asked.push({
            name: assembly.name,
            signal,
            answer: resolve,
            fail: () => {
              reject(new Error('lost'));
            },
          });
        }),
      explain: () => broken,
    }),
  );
  if (!live) throw new Error('no scope');
  return { document, asked, live };
}

beforeEach(() => {
  vi.useFakeTimers();
  scope = effectScope();
});
afterEach(() => {
  scope.stop();
  vi.useRealTimers();
});

describe('the live estimate', () => {
  test('asks shortly after the last change, once', async () => {
    const { document, asked, live } = setUp();
    document.value = documentNamed('two');
    document.value = documentNamed('three');
    await vi.advanceTimersByTimeAsync(50);
    expect(asked.map(({ name }) => name)).toEqual(['three']);
    asked[0]?.answer(answerTo('three'));
    await vi.advanceTimersByTimeAsync(0);
    expect(live.estimate.value?.engineVersion).toBe('three');
    expect(live.pending.value).toBe(false);
  });

  test('a newer document aborts the older question, whose late answer is never shown', async () => {
    const { document, asked, live } = setUp();
    await vi.advanceTimersByTimeAsync(50);
    document.value = documentNamed('two');
    expect(asked[0]?.signal.aborted).toBe(true);
    await vi.advanceTimersByTimeAsync(50);
    asked[1]?.answer(answerTo('two'));
    await vi.advanceTimersByTimeAsync(0);
    asked[0]?.answer(answerTo('one'));
    await vi.advanceTimersByTimeAsync(0);
    expect(live.estimate.value?.engineVersion).toBe('two');
  });

  test('says “updating” only when the answer is late', async () => {
    const { asked, live } = setUp();
    await vi.advanceTimersByTimeAsync(190);
    expect(live.slow.value).toBe(false);
    await vi.advanceTimersByTimeAsync(20);
    expect(live.slow.value).toBe(true);
    asked[0]?.answer(answerTo('one'));
    await vi.advanceTimersByTimeAsync(0);
    expect(live.slow.value).toBe(false);
  });

  test('a document that cannot be computed says where, and keeps the last answer marked as old', async () => {
    const { document, asked, live } = setUp();
    await vi.advanceTimersByTimeAsync(50);
    asked[0]?.answer(answerTo('one'));
    await vi.advanceTimersByTimeAsync(0);
    const wrong = documentNamed('two');
    document.value = { ...wrong, housing: { ...wrong.housing, outerM: ['12 apples', 0.1, 0.1] } };
    await vi.advanceTimersByTimeAsync(50);
    expect(asked.length).toBe(1);
    expect(live.failure.value?.errors[0]?.path).toBe('/housing/outerM/0');
    expect(live.estimate.value?.engineVersion).toBe('one');
    expect(live.isOld.value).toBe(true);
  });

  test('without connection it asks again by itself', async () => {
    const { asked, live } = setUp();
    await vi.advanceTimersByTimeAsync(50);
    asked[0]?.fail();
    await vi.advanceTimersByTimeAsync(0);
    expect(live.failure.value?.kind).toBe('connection');
    await vi.advanceTimersByTimeAsync(3500);
    expect(asked.length).toBe(2);
    asked[1]?.answer(answerTo('one'));
    await vi.advanceTimersByTimeAsync(0);
    expect(live.failure.value).toBeNull();
  });
});
