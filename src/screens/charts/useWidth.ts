/** Width of the box a picture is drawn in, so that it is redrawn at each width with the same type size, never scaled. */
import { type RefObject, useLayoutEffect, useRef, useState } from "react";

export function useWidth<Box extends HTMLElement>(initial: number): { box: RefObject<Box | null>; width: number } {
  const box = useRef<Box | null>(null);
  const [width, setWidth] = useState(initial);
  useLayoutEffect(() => {
    const element = box.current;
    if (element === null) return;
    const measure = (): void => setWidth(Math.max(120, Math.floor(element.clientWidth)));
    measure();
    const observer = new ResizeObserver(measure);
    observer.observe(element);
    return () => observer.disconnect();
  }, []);
  return { box, width };
}
