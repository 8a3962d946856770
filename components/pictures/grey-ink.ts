"use client";

import { useStore } from "zustand";
import { createStore } from "zustand/vanilla";

/** Whether classes are drawn in greys, light to dark, in place of their colours: as they come out of a printer without colour. */
const greyInk = createStore<{ isGrey: boolean }>(() => ({ isGrey: false }));

export function setGreyInk(isGrey: boolean): void {
  greyInk.setState({ isGrey });
}

export function isGreyInk(): boolean {
  return greyInk.getState().isGrey;
}

export function useGreyInk(): boolean {
  return useStore(greyInk, (state) => state.isGrey);
}
