"use client";

import { useEffect, useState, type RefObject } from "react";

export interface Size {
  width: number;
  height: number;
}

/** The size of an element in CSS pixels, followed as it changes; 0 until measured. */
export function useSize(element: RefObject<HTMLElement | null>): Size {
  const [size, setSize] = useState<Size>({ width: 0, height: 0 });
  useEffect(() => {
    const target = element.current;
    if (!target) return;
    const observer = new ResizeObserver(() => {
      const { clientWidth, clientHeight } = target;
      setSize((old) =>
        old.width === clientWidth && old.height === clientHeight ? old : { width: clientWidth, height: clientHeight },
      );
    });
    observer.observe(target);
    return () => observer.disconnect();
  }, [element]);
  return size;
}
