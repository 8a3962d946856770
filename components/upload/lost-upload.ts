/**
 * A note, kept with the tab, that a file is on its way: it outlives the page, so that a page that was left while sending
 * can say on return that the file may not have arrived.
 */
const runningHere = new Set<string>();

function keyOf(fieldId: string): string {
  return `coulterbook-sending-${fieldId}`;
}

/** Storage may be switched off by the person; nothing hangs on it but the note. */
function withStorage<T>(act: (storage: Storage) => T, otherwise: T): T {
  try {
    return act(window.sessionStorage);
  } catch {
    return otherwise;
  }
}

export function noteSending(fieldId: string, fileName: string): void {
  runningHere.add(fieldId);
  withStorage((storage) => storage.setItem(keyOf(fieldId), fileName), undefined);
}

/** The file arrived, was refused, or the person was told. */
export function forgetSending(fieldId: string): void {
  runningHere.delete(fieldId);
  withStorage((storage) => storage.removeItem(keyOf(fieldId)), undefined);
}

/** Name of a file whose sending ended with the page; null when none did, or it is still being sent. */
export function findLostUpload(fieldId: string): string | null {
  if (runningHere.has(fieldId)) return null;
  return withStorage((storage) => storage.getItem(keyOf(fieldId)), null);
}
