"use client";

import { createContext, useCallback, useContext, useMemo, useState, type ReactNode } from "react";
import { changeMe } from "@/lib/api/client";
import {
  displayUnit,
  OWN_UNITS,
  type OwnUnitKind,
  type OwnUnits,
  type SystemName,
  type UnitSystem,
} from "@/lib/units/display-unit";
import { formatQuantity } from "@/lib/units/format-quantity";

export type UnitSystemName = SystemName;

export interface ShownQuantity {
  number: string;
  /** Empty for a bare number. */
  unit: string;
}

export interface Units {
  /** What `formatQuantity` and `displayUnit` take. */
  system: UnitSystem;
  systemName: UnitSystemName;
  setSystem: (system: UnitSystemName) => void;
  /** Units chosen one by one over the system's. */
  own: OwnUnits;
  setOwn: (own: OwnUnits) => void;
  /** "943 N": number, thin space, unit. */
  format: (valueSi: number, unit: string, channel?: string) => string;
  /** The same in two parts. */
  parts: (valueSi: number, unit: string, channel?: string) => ShownQuantity;
  /** The number in the shown unit, not rounded to what a screen shows: for sorting and for files. */
  exact: (valueSi: number, unit: string, channel?: string) => number;
  areaUnit: string;
}

interface UnitState {
  systemName: UnitSystemName;
  own: OwnUnits;
  setSystem: (system: UnitSystemName) => void;
  setOwn: (own: OwnUnits) => void;
}

function unitsFor({ systemName, own, setSystem, setOwn }: UnitState): Units {
  const system: UnitSystem = Object.values(own).every((unit) => unit === undefined)
    ? systemName
    : { system: systemName, own };
  const shown = (valueSi: number, unit: string, channel?: string) =>
    formatQuantity(valueSi, unit, system, channel === undefined ? {} : { channel });
  return {
    system,
    systemName,
    setSystem,
    own,
    setOwn,
    format: (valueSi, unit, channel) => shown(valueSi, unit, channel).text,
    parts: (valueSi, unit, channel) => {
      const { text, unit: symbol } = shown(valueSi, unit, channel);
      return { number: symbol ? text.slice(0, -symbol.length).trimEnd() : text, unit: symbol };
    },
    // Twelve figures: beyond what any sensor tells, short of the last bit's noise.
    exact: (valueSi, unit, channel) => Number((valueSi / displayUnit(unit, system, channel).factor).toPrecision(12)),
    areaUnit: shown(1, "m2").unit,
  };
}

const OWN_KINDS = Object.keys(OWN_UNITS) as OwnUnitKind[];

// Pages without a person (a share, a test) read in metric and have nowhere to keep a choice.
const UnitsContext = createContext<Units>(
  unitsFor({ systemName: "metric", own: {}, setSystem: () => undefined, setOwn: () => undefined }),
);

export interface UnitsProviderProps {
  start: UnitSystemName;
  /** Units chosen one by one over the system's. */
  own?: OwnUnits;
  children: ReactNode;
  /** Keep a change with the person; off where nobody is signed in. */
  keep?: boolean;
}

/** The units every number below is shown in. */
export function UnitsProvider({ start, own: ownAtStart = {}, children, keep = true }: UnitsProviderProps) {
  const [systemName, setShown] = useState(start);
  const [own, setShownOwn] = useState(ownAtStart);
  const setSystem = useCallback(
    (next: UnitSystemName) => {
      setShown(next);
      // A lost save costs one press at the next visit; the screen is right either way.
      if (keep) void changeMe({ unitSystem: next }).catch(() => undefined);
    },
    [keep],
  );
  const setOwn = useCallback(
    (next: OwnUnits) => {
      setShownOwn(next);
      const unitPreferences = Object.fromEntries(OWN_KINDS.map((kind) => [kind, next[kind] ?? null]));
      if (keep) void changeMe({ unitPreferences }).catch(() => undefined);
    },
    [keep],
  );
  const units = useMemo(() => unitsFor({ systemName, own, setSystem, setOwn }), [systemName, own, setSystem, setOwn]);
  return <UnitsContext.Provider value={units}>{children}</UnitsContext.Provider>;
}

export function useUnits(): Units {
  return useContext(UnitsContext);
}
