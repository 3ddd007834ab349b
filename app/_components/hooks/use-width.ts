'use client';

import { useEffect, useRef, useState, type RefObject } from 'react';

/** The width of an element, px, as it changes; null until it is measured. */
export function useWidth<E extends HTMLElement>(): readonly [RefObject<E | null>, number | null] {
  const ref = useRef<E>(null);
  const [width, setWidth] = useState<number | null>(null);
  useEffect(() => {
    const element = ref.current;
    if (element === null) return;
    const observer = new ResizeObserver(() => setWidth(Math.floor(element.clientWidth)));
    observer.observe(element);
    return () => observer.disconnect();
  }, []);
  return [ref, width];
}
