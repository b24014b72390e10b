import { onScopeDispose, ref, shallowRef, type Ref } from 'vue';
import { messageOf } from '../api/client.js';

export interface Loaded<T> {
  data: Readonly<Ref<T | null>>;
  failure: Readonly<Ref<string>>;
  loading: Readonly<Ref<boolean>>;
  /** Loads anew; what was there stays until the answer has come. An older answer never replaces a newer one. */
  load: () => Promise<void>;
}

/** Something read from the server, with its loading and its failure. */
export function useLoaded<T>(fetch: (signal: AbortSignal) => Promise<T>): Loaded<T> {
  const data = shallowRef<T | null>(null);
  const failure = ref('');
  const loading = ref(false);
  let current: AbortController | null = null;

  async function load(): Promise<void> {
    current?.abort();
    const mine = new AbortController();
    current = mine;
    loading.value = true;
    try {
      const answer = await fetch(mine.signal);
      if (mine.signal.aborted) return;
      data.value = answer;
      failure.value = '';
    } catch (error) {
      if (!mine.signal.aborted) failure.value = messageOf(error);
    } finally {
      if (current === mine) loading.value = false;
    }
  }

  onScopeDispose(() => current?.abort());
  return { data, failure, loading, load };
}
