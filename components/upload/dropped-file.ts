/**
 * A file let go on the list of fields travels to the field's own page, which asks for the machine before sending it.
 * Held in memory only: a File cannot be put into an address.
 */
let kept: { fieldId: string; file: File } | null = null;

export function keepDroppedFile(fieldId: string, file: File): void {
  kept = { fieldId, file };
}

/** The file dropped for this field, once. */
export function takeDroppedFile(fieldId: string): File | null {
  if (kept?.fieldId !== fieldId) return null;
  const { file } = kept;
  kept = null;
  return file;
}
