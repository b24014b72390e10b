/**
 * Copies of unsaved drafts in the browser, so that a closed tab, a dead server or a lost connection loses nothing. Each
 * tab keeps its own copy; a copy whose tab is gone is found again when the assembly is next opened.
 */

export interface DraftCopy {
  assemblyId: string;
  userId: string;
  tab: string;
  /** Version of the draft on the server that this was typed upon. */
  baseVersion: number;
  document: Record<string, unknown>;
  keptAt: string;
}

const prefix = 'trimwick.draft.';

function keyOf(assemblyId: string, tab: string): string {
  return `${prefix}${assemblyId}.${tab}`;
}

function isCopy(value: unknown): value is DraftCopy {
  if (typeof value !== 'object' || value === null) return false;
  const copy = value as Partial<DraftCopy>;
  return typeof copy.baseVersion === 'number' && typeof copy.document === 'object' && typeof copy.tab === 'string';
}

/** @returns false where the browser has no room or no leave to keep it */
export function keepCopy(storage: Storage, copy: DraftCopy): boolean {
  try {
    storage.setItem(keyOf(copy.assemblyId, copy.tab), JSON.stringify(copy));
    return true;
  } catch {
    return false;
  }
}

export function dropCopy(storage: Storage, assemblyId: string, tab: string): void {
  storage.removeItem(keyOf(assemblyId, tab));
}

/** The newest copy of this person’s that no other living tab is still typing on. */
export function findCopy(
  storage: Storage,
  assemblyId: string,
  userId: string,
  isTakenElsewhere: (tab: string) => boolean,
): DraftCopy | null {
  const copies: DraftCopy[] = [];
  for (let i = 0; i < storage.length; i += 1) {
    const key = storage.key(i);
    if (!key?.startsWith(`${prefix}${assemblyId}.`)) continue;
    try {
      const copy: unknown = JSON.parse(storage.getItem(key) ?? 'null');
      if (isCopy(copy) && copy.userId === userId && !isTakenElsewhere(copy.tab)) copies.push(copy);
    } catch {
      // A torn copy cannot be read by anybody: leave it, the server’s draft stands.
    }
  }
  return copies.sort((a, b) => b.keptAt.localeCompare(a.keptAt))[0] ?? null;
}

const tabKey = 'trimwick.tab';
const lockName = (tab: string) => `trimwick-tab-${tab}`;

/** Holds a lock as long as the tab lives; false when another tab (a duplicate of this one) already has it. */
function claim(tab: string): Promise<boolean> {
  return new Promise((resolve) => {
    void navigator.locks.request(lockName(tab), { ifAvailable: true }, (lock) => {
      resolve(lock !== null);
      return lock === null ? undefined : new Promise(() => undefined);
    });
  });
}

let thisTab: Promise<string> | undefined;

/** Not `crypto.randomUUID`, which browsers withhold from plain http on other hosts than this one. */
function newTab(): string {
  return Math.random().toString(36).slice(2);
}

async function claimTab(): Promise<string> {
  let tab = sessionStorage.getItem(tabKey) ?? newTab();
  if ('locks' in navigator && !(await claim(tab))) {
    tab = newTab();
    await claim(tab);
  }
  sessionStorage.setItem(tabKey, tab);
  return tab;
}

/** This tab’s id: stays through a reload, differs in a duplicated tab. */
export function tabId(): Promise<string> {
  thisTab ??= claimTab();
  return thisTab;
}

/** Ids of the tabs that live now; without lock support none are known. */
export async function livingTabs(): Promise<ReadonlySet<string>> {
  if (!('locks' in navigator)) return new Set();
  const { held } = await navigator.locks.query();
  return new Set((held ?? []).map(({ name }) => (name ?? '').replace(/^trimwick-tab-/, '')));
}
