import { useEffect } from 'react';
import { api } from './api.ts';
import { renewIfDue } from './refresh.ts';
import { lastTouched, touch } from './signed-in.ts';

const IDLE_AFTER_MS = 20 * 60_000;
const TOUCHED_RECENTLY_MS = 4 * 60_000;
const EVENTS = ['pointerdown', 'keydown', 'wheel', 'touchmove'] as const;

/**
 * Signs out after 20 minutes without a touch in any tab. While somebody works on the page without
 * asking the server for anything, the server is told every few minutes that they are still there.
 */
export function useIdleLock(onIdle: () => void): void {
  useEffect(() => {
    let written = 0;
    let told = Date.now();
    const onTouch = () => {
      // The store is shared by all tabs; once in five seconds is enough.
      if (Date.now() - written < 5_000) return;
      written = Date.now();
      touch();
    };
    const look = () => {
      const quiet = Date.now() - lastTouched();
      if (quiet >= IDLE_AFTER_MS) return onIdle();
      const due = Date.now() - told > TOUCHED_RECENTLY_MS;
      if (!due) return;
      told = Date.now();
      const tell = quiet < TOUCHED_RECENTLY_MS ? () => api('/api/me') : () => undefined;
      renewIfDue().then(tell).catch(console.error);
    };
    for (const name of EVENTS) window.addEventListener(name, onTouch, { passive: true });
    // A device that slept wakes on a page that is long due to be closed.
    document.addEventListener('visibilitychange', look);
    const timer = setInterval(look, 15_000);
    return () => {
      for (const name of EVENTS) window.removeEventListener(name, onTouch);
      document.removeEventListener('visibilitychange', look);
      clearInterval(timer);
    };
  }, [onIdle]);
}
