"use client";

import { createContext, useCallback, useContext, useMemo, useState, type ReactNode } from "react";
import { areaUnitOf, showQuantity, type ShownQuantity, type UnitSystemName } from "@/components/units/show-quantity";
import { changeMe } from "@/lib/api/client";

export type { UnitSystemName };

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
  const area = areaUnitOf(system);
  const parts = (valueSi: number, unit: string, channel?: string) => showQuantity(valueSi, unit, system, channel);
  return {
    system,
    setSystem,
    parts,
    format: (valueSi, unit, channel) => {
      const shown = parts(valueSi, unit, channel);
      return shown.unit ? `${shown.number}\u2009${shown.unit}` : shown.number;
    },
    areaUnit: area.label,
    fromSquareMetres: (areaM2) => areaM2 / area.perUnitM2,
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
