'use client';

import { useSyncExternalStore } from 'react';

type Theme = 'system' | 'light' | 'night';
const NEXT: Record<Theme, Theme> = { system: 'light', light: 'night', night: 'system' };
const WORDS: Record<Theme, string> = {
  system: 'Light: as the system',
  light: 'Light: day',
  night: 'Light: night shift',
};

const CHANGED = 'fettle:theme';

function read(): Theme {
  const set = document.documentElement.dataset.theme;
  return set === 'light' || set === 'night' ? set : 'system';
}

function write(theme: Theme) {
  if (theme === 'system') delete document.documentElement.dataset.theme;
  else document.documentElement.dataset.theme = theme;
  document.cookie = `theme=${theme};path=/;max-age=31536000;samesite=lax`;
  window.dispatchEvent(new Event(CHANGED));
}

/** Day, night shift, or as the system has it. The choice travels in a cookie, so that a page never flashes. */
export function ThemeSwitch() {
  const theme = useSyncExternalStore(
    (listener) => {
      window.addEventListener(CHANGED, listener);
      return () => window.removeEventListener(CHANGED, listener);
    },
    read,
    () => 'system' as Theme,
  );
  return (
    <button
      type="button"
      onClick={() => write(NEXT[theme])}
      className="min-h-9 cursor-pointer rounded px-2 text-left text-sm text-soft hover:bg-petrol-wash"
    >
      {WORDS[theme]}
    </button>
  );
}
