import { computed, onScopeDispose, readonly, ref, shallowRef, watch, type Ref } from 'vue';
import { assemblyDocumentSchema, type AssemblyDocument } from '../../shared/schemas/assembly.js';
import type { Estimate } from '../../shared/schemas/estimate.js';
import { pointerOf } from './document-path.js';

/** Why there is no answer for the document as it stands. */
export interface EstimateFailure {
  kind: 'document' | 'refused' | 'connection';
  message: string;
  errors: { path: string; message: string }[];
}

interface Options {
  document: Ref<unknown>;
  /** The scenario to see in full; without it the one with least headroom. */
  scenario?: Ref<string | undefined>;
  request: (assembly: AssemblyDocument, scenario: string | undefined, signal: AbortSignal) => Promise<Estimate>;
  /** Turns what `request` threw into words. */
  explain: (error: unknown) => EstimateFailure;
  /** Quiet time before asking [ms]. */
  delayMs?: number;
  /** After this time without an answer the sheet says “updating” [ms]. */
  slowMs?: number;
}

const retryMs = 3000;

/** The document checked as the server checks it; every error with its pointer. */
export function checkDocument(document: unknown): { document: AssemblyDocument } | { failure: EstimateFailure } {
  const checked = assemblyDocumentSchema.safeParse(document);
  if (checked.success) return { document: checked.data };
  const errors = checked.error.issues.map((issue) => ({ path: pointerOf(issue.path), message: issue.message }));
  return { failure: { kind: 'document', message: errors[0]?.message ?? 'This cannot be computed', errors } };
}

/**
 * Keeps an estimate of a document while it is edited. A newer document aborts the older question, and an older answer
 * never replaces a newer one; a document that cannot be computed keeps the last answer, marked as old.
 */
export function useEstimate(options: Options) {
  const { document, scenario, request, explain, delayMs = 30, slowMs = 200 } = options;
  const estimate = shallowRef<Estimate | null>(null);
  const failure = shallowRef<EstimateFailure | null>(null);
  const pending = ref(false);
  const slow = ref(false);
  let controller: AbortController | undefined;
  let delay: ReturnType<typeof setTimeout> | undefined;
  let slowTimer: ReturnType<typeof setTimeout> | undefined;

  function stop(): void {
    controller?.abort();
    controller = undefined;
    clearTimeout(delay);
    clearTimeout(slowTimer);
  }

  function settle(): void {
    pending.value = false;
    slow.value = false;
    clearTimeout(slowTimer);
  }

  async function ask(checked: AssemblyDocument): Promise<void> {
    const mine = new AbortController();
    controller = mine;
    try {
      const answer = await request(checked, scenario?.value, mine.signal);
      if (controller !== mine) return;
      estimate.value = answer;
      failure.value = null;
      settle();
    } catch (error) {
      if (controller !== mine) return;
      failure.value = explain(error);
      settle();
      if (failure.value.kind === 'connection') delay = setTimeout(update, retryMs);
    }
  }

  function update(): void {
    stop();
    if (document.value === null || document.value === undefined) {
      settle();
      return;
    }
    const checked = checkDocument(document.value);
    if ('failure' in checked) {
      failure.value = checked.failure;
      settle();
      return;
    }
    pending.value = true;
    slowTimer = setTimeout(() => (slow.value = true), slowMs);
    delay = setTimeout(() => void ask(checked.document), delayMs);
  }

  watch([document, () => scenario?.value], update, { immediate: true, flush: 'sync' });
  onScopeDispose(stop);

  return {
    estimate,
    failure,
    pending: readonly(pending),
    /** True when the answer is late: the sheet says “updating”. */
    slow: readonly(slow),
    /** True when what is shown answers an earlier document, and no newer answer can be had. */
    isOld: computed(() => estimate.value !== null && failure.value !== null),
    retry: update,
  };
}
