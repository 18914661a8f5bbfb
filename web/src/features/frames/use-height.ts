import { useCallback, useRef, useState } from 'react';

/** The height of an element in whole CSS pixels, kept up to date. Give the first value to the element as its `ref`. */
export function useHeight(): [(element: HTMLElement | null) => void, number] {
  const [height, setHeight] = useState(0);
  const observer = useRef<ResizeObserver | null>(null);
  const ref = useCallback((element: HTMLElement | null) => {
    observer.current?.disconnect();
    if (!element) return;
    observer.current = new ResizeObserver(() => setHeight(Math.round(element.offsetHeight)));
    observer.current.observe(element);
  }, []);
  return [ref, height];
}
