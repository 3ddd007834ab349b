'use client';

import { useEffect, useRef } from 'react';

/** A tick box has the focus after it was ticked, and takes no letters. */
const typedInto =
  'input:not([type="checkbox"], [type="radio"], [type="button"], [type="submit"]), textarea, select, dialog[open]';

function isTyping(target: EventTarget | null): boolean {
  return target instanceof HTMLElement && (target.isContentEditable || target.closest(typedInto) !== null);
}

/** Does something at a single key, unless somebody is typing, a dialogue is open, or the key belongs to the browser. */
export function useShortcut(key: string, act: () => void, isOn = true): void {
  const latest = useRef(act);
  useEffect(() => {
    latest.current = act;
  });
  useEffect(() => {
    if (!isOn) return;
    const onKey = (event: KeyboardEvent) => {
      if (event.key.toLowerCase() !== key.toLowerCase() || event.repeat || event.defaultPrevented) return;
      if (event.ctrlKey || event.metaKey || event.altKey || isTyping(event.target)) return;
      if (document.querySelector('dialog[open]') !== null) return;
      event.preventDefault();
      latest.current();
    };
    document.addEventListener('keydown', onKey);
    return () => document.removeEventListener('keydown', onKey);
  }, [key, isOn]);
}
