import { defineStore } from 'pinia';
import { computed, ref, shallowRef, watch } from 'vue';
import { formatQuantity, type QuantityKind } from '../../shared/quantities.js';
import { may } from '../../shared/roles.js';
import type { AssemblyDocumentInput } from '../../shared/schemas/assembly.js';
import type { Assembly } from '../../shared/schemas/assembly-records.js';
import {
  type DraftConflict,
  explainError,
  fetchAssembly,
  isNotFound,
  makeRevision,
  requestEstimate,
  saveDraft,
} from '../api/sheet.js';
import { completeDraft } from '../composables/complete-draft.js';
import { differences, valueAt as valueIn, withValueAt } from '../composables/document-path.js';
import { numberInWords } from '../composables/document-values.js';
import { dropCopy, findCopy, keepCopy, livingTabs, tabId } from '../composables/draft-copies.js';
import { kelvins } from '../composables/numbers.js';
import { useAutosave } from '../composables/useAutosave.js';
import { useEstimate } from '../composables/useEstimate.js';
import { useHistory } from '../composables/useHistory.js';
import { useSessionStore } from './session.js';

/** What is saved: the draft with the assembly that it belongs to, which may not be the open one any more. */
interface Draft {
  assemblyId: string;
  document: Record<string, unknown>;
}

/** The assembly that is open on the sheet: its draft, the way back, the saving of it, and its estimate. */
export const useAssemblyStore = defineStore('assembly', () => {
  const session = useSessionStore();
  const record = shallowRef<Assembly | null>(null);
  const document = shallowRef<AssemblyDocumentInput | null>(null);
  const loading = ref<'idle' | 'loading' | 'ready' | 'missing' | 'failed'>('idle');
  const loadError = ref('');
  /** True when this draft was found in the browser and not on the server. */
  const restored = ref(false);
  /** Scenario to see in full; `undefined`: the one with least headroom. */
  const scenario = ref<string>();
  let tab = '';

  const readOnly = computed(() => !may(session.roles, 'editAssemblies'));
  const userId = computed(() => session.session?.user.id ?? '');

  const history = useHistory<AssemblyDocumentInput>();

  const autosave = useAutosave<Draft, DraftConflict>({
    save: (draft, expectedVersion) => saveDraft(draft.assemblyId, draft.document, expectedVersion),
    keep: (draft, baseVersion) =>
      keepCopy(localStorage, { ...draft, userId: userId.value, tab, baseVersion, keptAt: new Date().toISOString() }),
    drop: (draft) => {
      dropCopy(localStorage, draft.assemblyId, tab);
    },
  });

  function draftOf(typed: AssemblyDocumentInput): Draft {
    return { assemblyId: record.value?.id ?? '', document: { ...typed } };
  }

  const { estimate, failure, pending, slow, isOld, retry } = useEstimate({
    document,
    scenario,
    request: requestEstimate,
    explain: explainError,
  });

  // Signed in again in the middle of work: go on where it stopped.
  watch(
    () => session.session !== null,
    (signedIn) => {
      if (!signedIn || document.value === null) return;
      void autosave.flush();
      retry();
    },
  );

  function take(loaded: Assembly): void {
    record.value = loaded;
    history.forget();
    autosave.reset(loaded.draft.version, loaded.draft.updatedAt);
    document.value = completeDraft(loaded.draft.document);
  }

  /** What was typed in this browser and never reached the server. */
  async function restore(loaded: Assembly): Promise<void> {
    const living = await livingTabs();
    const copy = findCopy(localStorage, loaded.id, userId.value, (other) => other !== tab && living.has(other));
    if (!copy) return;
    if (copy.tab !== tab) dropCopy(localStorage, loaded.id, copy.tab);
    if (differences(completeDraft(copy.document), completeDraft(loaded.draft.document)).length === 0) {
      dropCopy(localStorage, loaded.id, tab);
      return;
    }
    restored.value = true;
    document.value = completeDraft(copy.document);
    // Sent upon the version that it was typed on: the server says so when somebody saved since.
    autosave.reset(copy.baseVersion, null);
    autosave.change(draftOf(document.value));
  }

  async function open(id: string): Promise<void> {
    close();
    loading.value = 'loading';
    try {
      tab = await tabId();
      const loaded = await fetchAssembly(id);
      take(loaded);
      if (!readOnly.value) await restore(loaded);
      loading.value = 'ready';
    } catch (error) {
      loading.value = isNotFound(error) ? 'missing' : 'failed';
      loadError.value = explainError(error).message;
    }
  }

  function close(): void {
    void autosave.flush();
    document.value = null;
    estimate.value = null;
    failure.value = null;
    scenario.value = undefined;
    restored.value = false;
    loading.value = 'idle';
    history.forget();
  }

  function replace(next: AssemblyDocumentInput): void {
    document.value = next;
    autosave.change(draftOf(next));
  }

  /** Changes one field, or several to the same value, as one step. */
  function set(pointers: string | readonly string[], value: unknown): void {
    if (readOnly.value || document.value === null) return;
    const paths = typeof pointers === 'string' ? [pointers] : pointers;
    const next = paths.reduce((changed, path) => withValueAt(changed, path, value), document.value);
    history.remember(document.value, paths.join(' '));
    replace(next);
  }

  /** Changes the document as a whole, as one step. */
  function change(field: string, edit: (document: AssemblyDocumentInput) => AssemblyDocumentInput): void {
    if (readOnly.value || document.value === null) return;
    history.remember(document.value, field);
    replace(edit(document.value));
  }

  function undo(): void {
    const back = document.value && history.undo(document.value);
    if (back) replace(back);
  }

  function redo(): void {
    const forth = document.value && history.redo(document.value);
    if (forth) replace(forth);
  }

  async function reload(): Promise<void> {
    if (record.value) take(await fetchAssembly(record.value.id));
  }

  async function keepMine(): Promise<void> {
    const conflict = autosave.conflict.value;
    if (!conflict || !document.value) return;
    history.forget();
    await autosave.resolveWith(draftOf(document.value), conflict.version);
  }

  async function takeTheirs(): Promise<void> {
    if (!record.value) return;
    const loaded = await fetchAssembly(record.value.id);
    dropCopy(localStorage, loaded.id, tab);
    restored.value = false;
    take(loaded);
  }

  /** Saves what is typed, then makes a numbered revision of it. */
  async function revise(note: string): Promise<void> {
    if (!record.value) return;
    await autosave.flush();
    await makeRevision(record.value.id, { expectedVersion: autosave.version(), note });
    await refreshRecord();
  }

  /** The record anew, with the draft left as it is typed. A revision closes the way back. */
  async function refreshRecord(): Promise<void> {
    if (!record.value) return;
    record.value = await fetchAssembly(record.value.id);
    history.forget();
  }

  const errors = computed(() => new Map((failure.value?.errors ?? []).map(({ path, message }) => [path, message])));

  function valueAt(pointer: string): unknown {
    return valueIn(document.value, pointer);
  }

  function errorAt(pointers: readonly string[]): string | undefined {
    const path = pointers.find((pointer) => errors.value.has(pointer));
    return path === undefined ? undefined : errors.value.get(path);
  }

  /** What stands in for a field that is not known, and what it is worth. */
  function assumedText(pointers: readonly string[], kind?: QuantityKind): string | undefined {
    const entry = estimate.value?.assumed.find(({ paths }) => pointers.some((pointer) => paths.includes(pointer)));
    if (!entry) return undefined;
    const say = (value: number | string) => {
      if (typeof value === 'string') return value;
      return kind === undefined ? numberInWords(value, entry.path) : formatQuantity(value, kind);
    };
    const effect =
      Math.abs(entry.effectK) < 0.05
        ? ', no effect on what binds'
        : `, typically ${say(entry.typical)}: worth ${entry.effectK > 0 ? '+' : ''}${kelvins(entry.effectK)}\u00a0K of margin`;
    return `${say(entry.value)}${effect}`;
  }

  return {
    record,
    document,
    loading,
    loadError,
    restored,
    readOnly,
    scenario,
    estimate,
    failure,
    pending,
    slow,
    isOld,
    retry,
    canUndo: history.canUndo,
    canRedo: history.canRedo,
    saveState: autosave.state,
    savedAt: autosave.savedAt,
    keptHere: autosave.keptHere,
    refusal: autosave.refusal,
    conflict: autosave.conflict,
    conflictIsOwn: computed(() => autosave.conflict.value?.updatedBy.id === userId.value),
    draftVersion: autosave.version,
    flush: autosave.flush,
    open,
    close,
    set,
    change,
    undo,
    redo,
    reload,
    keepMine,
    takeTheirs,
    revise,
    refreshRecord,
    valueAt,
    errorAt,
    assumedText,
  };
});
