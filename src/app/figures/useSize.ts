/** The size of an element in px, kept up to date; drawings are laid out in px so that line widths and letters stay as they are. */
import { type RefObject, useLayoutEffect, useRef, useState } from 'react';

export interface Size {
  readonly width: number;
  readonly height: number;
}

export function useSize<E extends Element>(): readonly [RefObject<E | null>, Size | null] {
  const element = useRef<E>(null);
  const [size, setSize] = useState<Size | null>(null);
  useLayoutEffect(() => {
    const present = element.current;
    if (!present) return;
    const measure = () => {
      const { width, height } = present.getBoundingClientRect();
      setSize((before) => (before && before.width === width && before.height === height ? before : { width, height }));
    };
    measure();
    const observer = new ResizeObserver(measure);
    observer.observe(present);
    return () => observer.disconnect();
  }, []);
  return [element, size];
}
