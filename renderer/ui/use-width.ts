import { type RefObject, useEffect, useState } from 'react';

/** Width of an element in CSS pixels, in steps that are worth a new drawing. */
export function useWidth(element: RefObject<HTMLElement | null>): number {
  const [widthPx, setWidthPx] = useState(1000);
  useEffect(() => {
    if (element.current === null) return undefined;
    const observer = new ResizeObserver(([entry]) => {
      const width = entry?.contentRect.width ?? 0;
      if (width > 0) setWidthPx(Math.round(width / 20) * 20);
    });
    observer.observe(element.current);
    return () => observer.disconnect();
  }, [element]);
  return widthPx;
}
