"use client";

import { createContext, useContext, useMemo, type ReactNode } from "react";

interface NotesAccess {
  fieldId: string;
  mayWrite: boolean;
}

const NotesAccessContext = createContext<NotesAccess | null>(null);

export interface NotesAccessProviderProps extends NotesAccess {
  children: ReactNode;
}

/** Says whose notes the maps below show, and whether this person may write any. */
export function NotesAccessProvider({ fieldId, mayWrite, children }: NotesAccessProviderProps) {
  const access = useMemo(() => ({ fieldId, mayWrite }), [fieldId, mayWrite]);
  return <NotesAccessContext.Provider value={access}>{children}</NotesAccessContext.Provider>;
}

/** Null where maps show no notes. */
export function useNotesAccess(): NotesAccess | null {
  return useContext(NotesAccessContext);
}
