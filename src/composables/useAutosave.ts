import { onScopeDispose, readonly, ref, shallowRef } from 'vue';

export type SaveState = 'saved' | 'changed' | 'saving' | 'unreachable' | 'conflict' | 'refused';

/** What became of one attempt. `conflict` carries the other person’s version. */
export type SaveOutcome<C> =
  | { kind: 'saved'; version: number; at: string }
  | { kind: 'conflict'; conflict: C }
  | { kind: 'unreachable'; message: string }
  | { kind: 'refused'; message: string };

interface Options<D, C> {
  save: (document: D, expectedVersion: number) => Promise<SaveOutcome<C>>;
  /** Keeps a copy in the browser, at once. Returns false where that is not possible. */
  keep: (document: D, baseVersion: number) => boolean;
  /** The server has this document: its copy is not needed any more. */
  drop: (document: D) => void;
  /** Quiet time after the last change, and the longest wait while changes go on [ms]. */
  quietMs?: number;
  longestMs?: number;
}

const firstRetryMs = 1000;
const longestRetryMs = 15000;

/**
 * Saves a document soon after each change, one attempt at a time, and keeps a copy in the browser until the server has
 * it. Without connection it tries again, ever more seldom; on a conflict it stops until somebody has chosen.
 */
export function useAutosave<D, C>(options: Options<D, C>) {
  const { save, keep, drop, quietMs = 600, longestMs = 1500 } = options;
  const state = ref<SaveState>('saved');
  const savedAt = ref<string | null>(null);
  const conflict = shallowRef<C | null>(null);
  /** Why the last attempt did not go. */
  const refusal = ref('');
  /** False when not even the browser could keep it. */
  const keptHere = ref(true);
  let version = 0;
  let waiting: { document: D } | null = null;
  let running: Promise<void> | null = null;
  let timer: ReturnType<typeof setTimeout> | undefined;
  let changedAt: number | null = null;
  let retryMs = firstRetryMs;
  /** Counts resets: an attempt for an earlier document must not speak for this one. */
  let epoch = 0;

  function schedule(ms: number): void {
    clearTimeout(timer);
    timer = setTimeout(() => void flush(), ms);
  }

  async function attempt(): Promise<void> {
    const sending = waiting;
    if (!sending) return;
    waiting = null;
    changedAt = null;
    state.value = 'saving';
    const started = epoch;
    const outcome = await save(sending.document, version);
    if (started !== epoch) {
      if (outcome.kind === 'saved') drop(sending.document);
      return;
    }
    // A change typed meanwhile is newer than what was sent.
    const newest = waiting as { document: D } | null;
    if (outcome.kind === 'saved') {
      version = outcome.version;
      savedAt.value = outcome.at;
      retryMs = firstRetryMs;
      if (newest) {
        keptHere.value = keep(newest.document, version);
        state.value = 'changed';
        schedule(quietMs);
      } else {
        drop(sending.document);
        state.value = 'saved';
      }
      return;
    }
    waiting = newest ?? sending;
    if (outcome.kind === 'unreachable') {
      state.value = 'unreachable';
      refusal.value = outcome.message;
      schedule(retryMs);
      retryMs = Math.min(retryMs * 2, longestRetryMs);
    } else if (outcome.kind === 'conflict') {
      conflict.value = outcome.conflict;
      state.value = 'conflict';
    } else {
      refusal.value = outcome.message;
      state.value = 'refused';
    }
  }

  /** Sends now what waits to be sent; resolves when nothing is under way. */
  async function flush(): Promise<void> {
    clearTimeout(timer);
    if (running) await running;
    if (!waiting || state.value === 'conflict') return;
    running = attempt().finally(() => {
      running = null;
    });
    await running;
  }

  function change(document: D): void {
    waiting = { document };
    keptHere.value = keep(document, version);
    if (state.value === 'conflict') return;
    if (state.value !== 'saving' && state.value !== 'unreachable') state.value = 'changed';
    changedAt ??= Date.now();
    if (state.value === 'unreachable') return;
    schedule(Math.min(quietMs, Math.max(changedAt + longestMs - Date.now(), 0)));
  }

  /** Start over from what the server has. */
  function reset(serverVersion: number, at: string | null): void {
    clearTimeout(timer);
    epoch += 1;
    version = serverVersion;
    waiting = null;
    changedAt = null;
    conflict.value = null;
    refusal.value = '';
    savedAt.value = at;
    state.value = 'saved';
    retryMs = firstRetryMs;
  }

  function online(): void {
    if (state.value !== 'unreachable') return;
    retryMs = firstRetryMs;
    void flush();
  }

  /** After a conflict: save this document over the version that the server has now. */
  async function resolveWith(document: D, serverVersion: number): Promise<void> {
    conflict.value = null;
    version = serverVersion;
    waiting = { document };
    keptHere.value = keep(document, version);
    state.value = 'changed';
    await flush();
  }

  globalThis.addEventListener('online', online);
  onScopeDispose(() => {
    globalThis.removeEventListener('online', online);
    clearTimeout(timer);
  });

  return {
    state: readonly(state),
    savedAt: readonly(savedAt),
    conflict,
    refusal: readonly(refusal),
    keptHere: readonly(keptHere),
    version: () => version,
    change,
    flush,
    reset,
    resolveWith,
  };
}
