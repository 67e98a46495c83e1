import { useLayoutEffect, useRef, useState, type RefObject } from 'react';

/** Width of an element in CSS pixels, followed as it changes, so that a drawing can be made for it and not scaled to it. */
export function useElementWidth<Element extends HTMLElement>(
  initial: number,
): [RefObject<Element | null>, number] {
  const ref = useRef<Element>(null);
  const [width, setWidth] = useState(initial);
  useLayoutEffect(() => {
    const element = ref.current;
    if (!element) return;
    const measure = (): void => {
      // An element that is not laid out (a closed tab) measures zero; the last good width then stays.
      if (element.clientWidth > 0) setWidth(element.clientWidth);
    };
    measure();
    if (typeof ResizeObserver === 'undefined') return;
    const observer = new ResizeObserver(measure);
    observer.observe(element);
    return () => observer.disconnect();
  }, []);
  return [ref, width];
}
