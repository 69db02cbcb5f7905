'use client';

import { useCallback, useSyncExternalStore } from 'react';
import { EMPTY_DRAFT, type SheetDraft } from './types';

const CHANGED = 'fettle:draft';
const cache = new Map<string, { text: string; draft: SheetDraft }>();

function read(key: string): SheetDraft {
  const text = localStorage.getItem(key) ?? '';
  const known = cache.get(key);
  if (known?.text === text) return known.draft;
  let draft = EMPTY_DRAFT;
  try {
    if (text) draft = { ...EMPTY_DRAFT, ...(JSON.parse(text) as Partial<SheetDraft>) };
  } catch {
    // A draft that can't be read is worth nothing; the sheet starts afresh.
  }
  cache.set(key, { text, draft });
  return draft;
}

/** The entries of one sheet, kept on this device so that a closed tab or a dead network loses none of them. */
export function useDraft(changeId: string): [SheetDraft, (change: Partial<SheetDraft>) => void, () => void] {
  const key = `fettle:sheet:${changeId}`;
  const draft = useSyncExternalStore(
    (listener) => {
      window.addEventListener(CHANGED, listener);
      window.addEventListener('storage', listener);
      return () => {
        window.removeEventListener(CHANGED, listener);
        window.removeEventListener('storage', listener);
      };
    },
    () => read(key),
    () => EMPTY_DRAFT,
  );
  const write = useCallback(
    (change: Partial<SheetDraft>) => {
      localStorage.setItem(key, JSON.stringify({ ...read(key), ...change }));
      window.dispatchEvent(new Event(CHANGED));
    },
    [key],
  );
  const clear = useCallback(() => {
    localStorage.removeItem(key);
    window.dispatchEvent(new Event(CHANGED));
  }, [key]);
  return [draft, write, clear];
}
