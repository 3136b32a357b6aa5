import { useEffect, useSyncExternalStore } from 'react';
import { looks, type Look } from './themes';

const KEPT_AS = 'hubtack.look';
const EVENT = 'hubtack:look';

const isLook = (value: string | null): value is Look => looks.includes(value as Look);

function systemLook(): Look {
  if (matchMedia('(prefers-contrast: more)').matches) return 'contrast';
  return matchMedia('(prefers-color-scheme: dark)').matches ? 'dark' : 'light';
}

/** The chosen look, or what the system asks for. */
function currentLook(): Look {
  const kept = localStorage.getItem(KEPT_AS);
  return isLook(kept) ? kept : systemLook();
}

function subscribe(onChange: () => void): () => void {
  const queries = ['(prefers-color-scheme: dark)', '(prefers-contrast: more)'].map((query) =>
    matchMedia(query),
  );
  for (const query of queries) query.addEventListener('change', onChange);
  addEventListener(EVENT, onChange);
  return () => {
    for (const query of queries) query.removeEventListener('change', onChange);
    removeEventListener(EVENT, onChange);
  };
}

export function setLook(look: Look | null): void {
  if (look === null) localStorage.removeItem(KEPT_AS);
  else localStorage.setItem(KEPT_AS, look);
  dispatchEvent(new Event(EVENT));
}

export function useLook(): Look {
  const look = useSyncExternalStore(subscribe, currentLook);
  useEffect(() => {
    document.documentElement.dataset.look = look;
  }, [look]);
  return look;
}
