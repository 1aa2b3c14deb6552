import { useLayoutEffect, useRef, useState } from 'react';

/** The width an element has got, so that a drawing is made in real pixels and its lettering keeps its size. */
export function useWidth<T extends HTMLElement>(before: number) {
  const ref = useRef<T>(null);
  const [width, setWidth] = useState(before);
  useLayoutEffect(() => {
    const element = ref.current;
    if (!element || typeof ResizeObserver === 'undefined') return;
    const read = () => {
      const found = Math.floor(element.getBoundingClientRect().width);
      if (found > 0) setWidth(found);
    };
    read();
    const observer = new ResizeObserver(read);
    observer.observe(element);
    return () => observer.disconnect();
  }, []);
  return [ref, width] as const;
}
