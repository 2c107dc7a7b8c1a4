import { type RefObject, useLayoutEffect, useRef, useState } from 'react';

/** The width a plot has on the page, followed. */
export function usePlotWidth(): [RefObject<HTMLDivElement | null>, number] {
  const place = useRef<HTMLDivElement | null>(null);
  const [width, setWidth] = useState(0);
  useLayoutEffect(() => {
    const element = place.current;
    if (element === null) return undefined;
    const measure = () => setWidth(Math.round(element.clientWidth));
    measure();
    const observer = new ResizeObserver(measure);
    observer.observe(element);
    return () => observer.disconnect();
  }, []);
  return [place, width];
}
