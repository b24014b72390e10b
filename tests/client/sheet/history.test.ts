import { beforeEach, describe, expect, test } from 'vitest';
import { dropCopy, findCopy, keepCopy, type DraftCopy } from '../../../src/composables/draft-copies.js';
import { useHistory } from '../../../src/composables/useHistory.js';

describe('undo and redo', () => {
  test('typing in one field is one step, another field is another', () => {
    let at = 0;
    const history = useHistory<string>(() => at);
    history.remember('', 'name');
    at += 100;
    history.remember('a', 'name');
    history.remember('ab', 'size');
    expect(history.undo('ab, 5')).toBe('ab');
    expect(history.undo('ab')).toBe('');
    expect(history.undo('')).toBeUndefined();
    expect(history.redo('')).toBe('ab');
    expect(history.redo('ab')).toBe('ab, 5');
    expect(history.canRedo.value).toBe(false);
  });

  test('a pause makes a new step, and a new edit closes the way forth', () => {
    let at = 0;
    const history = useHistory<string>(() => at);
    history.remember('a', 'name');
    at += 5000;
    history.remember('b', 'name');
    expect(history.undo('c')).toBe('b');
    history.remember('b', 'name');
    expect(history.canRedo.value).toBe(false);
  });

  test('nothing leads back across a save of somebody else or a revision', () => {
    const history = useHistory<string>();
    history.remember('a', 'name');
    history.forget();
    expect(history.canUndo.value).toBe(false);
    expect(history.undo('b')).toBeUndefined();
  });
});

describe('copies of drafts in the browser', () => {
  const copy: DraftCopy = {
    assemblyId: 'a1',
    userId: 'u1',
    tab: 't1',
    baseVersion: 3,
    document: { name: 'Lamp' },
    keptAt: '2026-01-01T00:00:00.000Z',
  };
  const nobody = () => false;

  beforeEach(() => {
    localStorage.clear();
  });

  test('come back for the same assembly and person, the newest first', () => {
    keepCopy(localStorage, copy);
    keepCopy(localStorage, { ...copy, tab: 't2', keptAt: '2026-01-02T00:00:00.000Z', document: { name: 'Newer' } });
    expect(findCopy(localStorage, 'a1', 'u1', nobody)?.document).toEqual({ name: 'Newer' });
    expect(findCopy(localStorage, 'a2', 'u1', nobody)).toBeNull();
    expect(findCopy(localStorage, 'a1', 'u2', nobody)).toBeNull();
  });

  test('of a tab that still lives are left to it', () => {
    keepCopy(localStorage, copy);
    expect(findCopy(localStorage, 'a1', 'u1', (tab) => tab === 't1')).toBeNull();
  });

  test('are gone when dropped, and a torn one does no harm', () => {
    keepCopy(localStorage, copy);
    localStorage.setItem('trimwick.draft.a1.t9', '{"baseVersion": 3, "docu');
    dropCopy(localStorage, 'a1', 't1');
    expect(findCopy(localStorage, 'a1', 'u1', nobody)).toBeNull();
  });
});
