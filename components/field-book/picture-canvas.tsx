"use client";

import { useEffect, useRef } from "react";
import type { Picture } from "@/lib/map-state/paint-pass";

/** Shows a picture stretched over its place with hard edges between its pixels. Transparent pixels show what lies behind. */
export function PictureCanvas({ picture, label }: { picture: Picture | null; label: string }) {
  const canvas = useRef<HTMLCanvasElement>(null);
  useEffect(() => {
    const target = canvas.current;
    if (!target || !picture || picture.width === 0 || picture.height === 0) return;
    target.width = picture.width;
    target.height = picture.height;
    target.getContext("2d")?.putImageData(new ImageData(picture.data, picture.width, picture.height), 0, 0);
  }, [picture]);
  return (
    <canvas
      ref={canvas}
      role="img"
      aria-label={label}
      className="pointer-events-none absolute inset-0 size-full [image-rendering:pixelated]"
    />
  );
}
