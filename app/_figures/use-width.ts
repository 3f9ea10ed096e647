"use client";

import { type RefObject, useLayoutEffect, useRef, useState } from "react";

/** Width of an element in whole pixels; `initial` until it is in the page, as on the server. */
export function useWidth<E extends Element>(initial: number): { ref: RefObject<E | null>; width: number } {
  const ref = useRef<E>(null);
  const [width, setWidth] = useState(initial);
  useLayoutEffect(() => {
    const element = ref.current;
    if (element === null) return;
    const measure = () =>
      setWidth(Math.max(240, Math.round(element.getBoundingClientRect().width)) || initial);
    measure();
    const observer = new ResizeObserver(measure);
    observer.observe(element);
    return () => observer.disconnect();
  }, [initial]);
  return { ref, width };
}
