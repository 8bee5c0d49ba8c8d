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
  /** What our own scrolling last said. The page draws later than the finger moves: an older reading must not pull back. */
  const said = useRef<number | null>(null);
  useEffect(() => {
    if (!scroller.current || at === said.current) return;
    said.current = at;
    scroller.current.scrollTop = at;
  }, [at]);
  return {
    scroller,
    width,
    goTo: (nm: number) => onMove(clamp(nm)),
    onScroll: () => {
      if (!scroller.current) return;
      const now = clamp(scroller.current.scrollTop);
      // The echo of our own scrolling says nothing new, and may come after a key has already asked for another place.
      if (now === said.current) return;
      said.current = now;
      onMove(now);
    },
  };
}
