import { computed, shallowRef } from 'vue';

/** Edits of one field within this time are one step [ms]. */
const togetherMs = 1200;
const longestHistory = 200;

interface Step<T> {
  document: T;
  /** What was edited to leave this state; consecutive edits of the same field are one step. */
  field: string;
  at: number;
}

/** Undo and redo of a document that is never changed in place. `forget` closes the way back. */
export function useHistory<T>(now: () => number = Date.now) {
  const past = shallowRef<readonly Step<T>[]>([]);
  const future = shallowRef<readonly Step<T>[]>([]);

  /** Remember the document as it was before an edit of `field`. */
  function remember(before: T, field: string): void {
    const last = past.value.at(-1);
    const at = now();
    future.value = [];
    if (last && last.field === field && at - last.at < togetherMs) {
      past.value = [...past.value.slice(0, -1), { ...last, at }];
      return;
    }
    past.value = [...past.value, { document: before, field, at }].slice(-longestHistory);
  }

  /** The document before the last step, or `undefined` where there is none. */
  function undo(present: T): T | undefined {
    const step = past.value.at(-1);
    if (!step) return undefined;
    past.value = past.value.slice(0, -1);
    future.value = [...future.value, { ...step, document: present }];
    return step.document;
  }

  function redo(present: T): T | undefined {
    const step = future.value.at(-1);
    if (!step) return undefined;
    future.value = future.value.slice(0, -1);
    past.value = [...past.value, { ...step, document: present, at: 0 }];
    return step.document;
  }

  function forget(): void {
    past.value = [];
    future.value = [];
  }

  return {
    canUndo: computed(() => past.value.length > 0),
    canRedo: computed(() => future.value.length > 0),
    remember,
    undo,
    redo,
    forget,
  };
}
