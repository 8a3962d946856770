import { createStore, type StoreApi } from "zustand/vanilla";
import { describeFailure } from "@/lib/api/api-problem";

/** How long something removed can be brought back. */
export const UNDO_MS = 30_000;

export interface Removal {
  /** Id of what goes. */
  id: string;
  /** As it is said: "East quarter". */
  name: string;
  /** Takes it away for good; resolves once lists no longer hold it. */
  send: () => Promise<void>;
}

export interface RemovalsState {
  /** Gone from the lists; not yet gone on the server, or just now. */
  waiting: readonly Removal[];
  /** Why the last one that was refused is back. */
  refused: { name: string; words: string } | null;
  begin: (removal: Removal) => void;
  undo: (id: string) => void;
  /** Without waiting: when the page is left, or when asked. */
  sendAll: () => void;
  forgetRefused: () => void;
}

/**
 * Removals wait here before anything is deleted, so that an undo restores nothing: it only calls off. Whoever closes the
 * page has meant it (`sendAll`).
 */
export function createRemovals(waitMs = UNDO_MS): StoreApi<RemovalsState> {
  const timers = new Map<string, ReturnType<typeof setTimeout>>();
  return createStore<RemovalsState>((set, get) => {
    const drop = (id: string) => set({ waiting: get().waiting.filter((removal) => removal.id !== id) });
    const sendNow = async ({ id, name, send }: Removal) => {
      timers.delete(id);
      try {
        await send();
      } catch (error) {
        set({ refused: { name, words: describeFailure(error) } });
      }
      drop(id);
    };
    return {
      waiting: [],
      refused: null,
      begin: (removal) => {
        if (timers.has(removal.id)) return;
        timers.set(
          removal.id,
          setTimeout(() => void sendNow(removal), waitMs),
        );
        set({ waiting: [...get().waiting, removal], refused: null });
      },
      undo: (id) => {
        const timer = timers.get(id);
        // On its way already: too late.
        if (timer === undefined) return;
        clearTimeout(timer);
        timers.delete(id);
        drop(id);
      },
      sendAll: () => {
        for (const removal of get().waiting) {
          const timer = timers.get(removal.id);
          if (timer === undefined) continue;
          clearTimeout(timer);
          void sendNow(removal);
        }
      },
      forgetRefused: () => set({ refused: null }),
    };
  });
}
