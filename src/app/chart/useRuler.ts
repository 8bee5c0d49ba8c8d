import { useEffect, useLayoutEffect, useRef, useState } from 'preact/hooks';

/** Width until the window has been measured: a phone of 390 pixels beside the overview. */
const FIRST_WIDTH = 302;

/** Keeps a scroll position and a thickness in step, at one pixel a nanometre; the width is the window's, pixels. */
export function useRuler(at: number, endNm: number, onMove: (nm: number) => void) {
  const scroller = useRef<HTMLDivElement>(null);
  const [width, setWidth] = useState(FIRST_WIDTH);
  const clamp = (nm: number) => Math.min(endNm, Math.max(0, Math.round(nm)));
  useLayoutEffect(() => {
    const element = scroller.current;
    if (!element) return;
    const observer = new ResizeObserver(() => setWidth(element.clientWidth));
    observer.observe(element);
    return () => observer.disconnect();
  }, []);
  useEffect(() => {
    const element = scroller.current;
    // Only where someone else moved the reading: our own scrolling must not be pulled back to whole pixels.
    if (element && clamp(element.scrollTop) !== at) element.scrollTop = at;
  });
  return {
    scroller,
    width,
    goTo: (nm: number) => onMove(clamp(nm)),
    onScroll: () => {
      if (scroller.current) onMove(clamp(scroller.current.scrollTop));
    },
  };
}
