"use client";

import { createContext, useCallback, useContext, useMemo, useState, type ReactNode } from "react";
import { changeMe } from "@/lib/api/client";
import type { UnitSystem } from "@/lib/units/display-unit";
import { formatQuantity } from "@/lib/units/format-quantity";

export type UnitSystemName = UnitSystem;

export interface ShownQuantity {
  number: string;
  /** Empty for a bare number. */
  unit: string;
}

export interface Units {
  system: UnitSystemName;
  setSystem: (system: UnitSystemName) => void;
  /** "943 N": number, thin space, unit. */
  format: (valueSi: number, unit: string, channel?: string) => string;
  /** The same in two parts. */
  parts: (valueSi: number, unit: string, channel?: string) => ShownQuantity;
  areaUnit: string;
  fromSquareMetres: (areaM2: number) => number;
}

function unitsFor(system: UnitSystemName, setSystem: (system: UnitSystemName) => void): Units {
  const shown = (valueSi: number, unit: string, channel?: string) =>
    formatQuantity(valueSi, unit, system, channel === undefined ? {} : { channel });
  return {
    system,
    setSystem,
    format: (valueSi, unit, channel) => shown(valueSi, unit, channel).text,
    parts: (valueSi, unit, channel) => {
      const { text, unit: symbol } = shown(valueSi, unit, channel);
      return { number: symbol ? text.slice(0, -symbol.length).trimEnd() : text, unit: symbol };
    },
    areaUnit: shown(1, "m2").unit,
    fromSquareMetres: (areaM2) => shown(areaM2, "m2").value ?? NaN,
  };
}

// Pages without a person (a share, a test) read in metric and have nowhere to keep a choice.
const UnitsContext = createContext<Units>(unitsFor("metric", () => undefined));

export interface UnitsProviderProps {
  start: UnitSystemName;
  children: ReactNode;
  /** Keep a change with the person; off where nobody is signed in. */
  keep?: boolean;
}

/** The units every number below is shown in. */
export function UnitsProvider({ start, children, keep = true }: UnitsProviderProps) {
  const [system, setShown] = useState(start);
  const setSystem = useCallback(
    (next: UnitSystemName) => {
      setShown(next);
      // A lost save costs one press at the next visit; the screen is right either way.
      if (keep) void changeMe({ unitSystem: next }).catch(() => undefined);
    },
    [keep],
  );
  const units = useMemo(() => unitsFor(system, setSystem), [system, setSystem]);
  return <UnitsContext.Provider value={units}>{children}</UnitsContext.Provider>;
}

export function useUnits(): Units {
  return useContext(UnitsContext);
}
