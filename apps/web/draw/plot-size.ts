import { type RefObject, useLayoutEffect, useRef, useState } from 'react';
import { PAPER_WIDTH_PX, useOnPaper } from './on-paper.js';

/**
 * The width a plot has, followed: on the page that of its place, on paper the sheet's.
 * @param mostPx it is never wider
 */
export function usePlotWidth(mostPx = PAPER_WIDTH_PX): [RefObject<HTMLDivElement | null>, number] {
  const place = useRef<HTMLDivElement | null>(null);
  const [width, setWidth] = useState(0);
  const isOnPaper = useOnPaper();
  useLayoutEffect(() => {
    const element = place.current;
    if (element === null) return undefined;
    const measure = () => setWidth(Math.round(element.clientWidth));
    measure();
    const observer = new ResizeObserver(measure);
    observer.observe(element);
    return () => observer.disconnect();
  }, []);
  return [place, isOnPaper && width > 0 ? Math.min(mostPx, PAPER_WIDTH_PX) : width];
}
