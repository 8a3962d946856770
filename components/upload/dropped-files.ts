/**
 * Files let go on the list of fields travel to the field's own page, which asks for the machine before sending them.
 * Held in memory only: a File cannot be put into an address.
 */
let kept: { fieldId: string; files: File[] } | null = null;

export function keepDroppedFiles(fieldId: string, files: File[]): void {
  kept = { fieldId, files };
}

/** The files dropped for this field, once; none where none were. */
export function takeDroppedFiles(fieldId: string): File[] {
  if (kept?.fieldId !== fieldId) return [];
  const { files } = kept;
  kept = null;
  return files;
}
