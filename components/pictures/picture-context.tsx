"use client";

import { createContext, useContext, useEffect, useMemo, useState, type ReactNode } from "react";
import type { Figure } from "@/components/pictures/figure";
import { createFigureList, type FigureList } from "@/components/pictures/figure-list";
import type { PictureSource } from "@/lib/pictures/picture-words";

interface Pictures {
  source: PictureSource;
  /** The figures on the page now, for print. */
  figures: FigureList;
  /** Whether classes can be shown in grey here. */
  hasGrey: boolean;
}

const PicturesContext = createContext<Pictures | null>(null);

export interface PicturesProviderProps {
  source: PictureSource;
  hasGrey?: boolean;
  children: ReactNode;
}

/** A page whose charts and maps can be taken away as pictures: says where they come from. */
export function PicturesProvider({ source, hasGrey = false, children }: PicturesProviderProps) {
  const [figures] = useState(createFigureList);
  const pictures = useMemo(() => ({ source, figures, hasGrey }), [source, figures, hasGrey]);
  return <PicturesContext.Provider value={pictures}>{children}</PicturesContext.Provider>;
}

/** Null on pages without pictures. */
export function usePictures(): Pictures | null {
  return useContext(PicturesContext);
}

/** Makes a figure known to the page, so that it is printed with the others. */
export function useFigure(figure: Figure): void {
  const figures = usePictures()?.figures;
  useEffect(() => figures?.add(figure), [figures, figure]);
}
