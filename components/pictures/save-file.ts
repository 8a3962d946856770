/** Hands a file to the person. */
export function saveFileAs(fileName: string, file: Blob): void {
  const address = URL.createObjectURL(file);
  const link = document.createElement("a");
  link.href = address;
  link.download = fileName;
  link.click();
  // Later, because some browsers read the address after the click returns.
  setTimeout(() => URL.revokeObjectURL(address), 10_000);
}
