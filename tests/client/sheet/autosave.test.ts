import { effectScope } from 'vue';
import { afterEach, beforeEach, describe, expect, test, vi } from 'vitest';
import { useAutosave, type SaveOutcome } from '../../../src/composables/useAutosave.js';

type Outcome = SaveOutcome<string>;

function setUp(answers: Outcome[]) {
  const sent: { document: string; version: number }[] = [];
  const kept: string[] = [];
  let dropped = 0;
  const scope = effectScope();
  const autosave = scope.run(() =>
    useAutosave<string, string>({
      save: (document, version) => {
        sent.push({ document, version });
        return Promise.resolve(answers.shift() ?? { kind: 'saved', version: version + 1, at: '2026-01-01T00:00:00Z' });
      },
      keep: (document) => {
        kept.push(document);
        return true;
      },
      drop: () => {
        dropped += 1;
      },
    }),
  );
  if (!autosave) throw new Error('no scope');
  autosave.reset(1, null);
  return { autosave, sent, kept, dropped: () => dropped, stop: () => scope.stop() };
}

beforeEach(() => {
  vi.useFakeTimers();
});
afterEach(() => {
  vi.useRealTimers();
});

describe('autosave', () => {
  test('keeps a copy in the browser at once, and sends within a second of the last change', async () => {
    const { autosave, sent, kept, dropped } = setUp([]);
    autosave.change('a');
    expect(kept).toEqual(['a']);
    expect(sent).toEqual([]);
    await vi.advanceTimersByTimeAsync(1000);
    expect(sent).toEqual([{ document: 'a', version: 1 }]);
    expect(autosave.state.value).toBe('saved');
    expect(dropped()).toBe(1);
  });

  test('does not wait for ever while somebody keeps typing', async () => {
    const { autosave, sent } = setUp([]);
    for (let i = 0; i < 10; i += 1) {
      autosave.change(`typing ${String(i)}`);
      await vi.advanceTimersByTimeAsync(300);
    }
    expect(sent.length).toBeGreaterThanOrEqual(1);
    await vi.advanceTimersByTimeAsync(1000);
    expect(sent.at(-1)?.document).toBe('typing 9');
  });

  test('each save expects the version that the last one made', async () => {
    const { autosave, sent } = setUp([]);
    autosave.change('a');
    await vi.advanceTimersByTimeAsync(1000);
    autosave.change('b');
    await vi.advanceTimersByTimeAsync(1000);
    expect(sent.map(({ version }) => version)).toEqual([1, 2]);
  });

  test('tries again, ever more seldom, until the server is back; then sends the newest', async () => {
    const { autosave, sent, dropped } = setUp([
      { kind: 'unreachable', message: 'no connection' },
      { kind: 'unreachable', message: 'no connection' },
      { kind: 'unreachable', message: 'no connection' },
    ]);
    autosave.change('a');
    await vi.advanceTimersByTimeAsync(600);
    expect(autosave.state.value).toBe('unreachable');
    autosave.change('b');
    await vi.advanceTimersByTimeAsync(999);
    expect(sent.length).toBe(1);
    await vi.advanceTimersByTimeAsync(1);
    expect(sent.length).toBe(2);
    await vi.advanceTimersByTimeAsync(2000);
    expect(sent.length).toBe(3);
    expect(dropped()).toBe(0);
    await vi.advanceTimersByTimeAsync(4000);
    expect(sent.map(({ document }) => document)).toEqual(['a', 'b', 'b', 'b']);
    expect(autosave.state.value).toBe('saved');
  });

  test('tries at once when the browser comes online', async () => {
    const { autosave, sent } = setUp([{ kind: 'unreachable', message: 'no connection' }]);
    autosave.change('a');
    await vi.advanceTimersByTimeAsync(600);
    globalThis.dispatchEvent(new Event('online'));
    await vi.advanceTimersByTimeAsync(0);
    expect(sent.length).toBe(2);
    expect(autosave.state.value).toBe('saved');
  });

  test('stops on a conflict, keeps what is typed, and saves over theirs only when told', async () => {
    const { autosave, sent, kept } = setUp([{ kind: 'conflict', conflict: 'theirs' }]);
    autosave.change('mine');
    await vi.advanceTimersByTimeAsync(600);
    expect(autosave.state.value).toBe('conflict');
    expect(autosave.conflict.value).toBe('theirs');
    autosave.change('mine, more');
    await vi.advanceTimersByTimeAsync(20000);
    expect(sent.length).toBe(1);
    expect(kept.at(-1)).toBe('mine, more');
    await autosave.resolveWith('mine, more', 7);
    expect(sent.at(-1)).toEqual({ document: 'mine, more', version: 7 });
    expect(autosave.state.value).toBe('saved');
  });

  test('an answer for an earlier assembly does not speak for the one that is open now', async () => {
    const { autosave } = setUp([{ kind: 'conflict', conflict: 'old' }]);
    autosave.change('old assembly');
    const sending = autosave.flush();
    autosave.reset(5, null);
    await sending;
    expect(autosave.state.value).toBe('saved');
    expect(autosave.version()).toBe(5);
  });
});
