export type CsvValue = string | number | boolean | null | undefined;

/**
 * One cell of a CSV file (RFC 4180). Text that a spreadsheet would run as a formula (starting with = + - @ tab or CR)
 * gets an apostrophe before it; numbers stay numbers. Missing is an empty cell, never 0.
 */
export function csvCell(value: CsvValue): string {
  if (value === null || value === undefined) return "";
  if (typeof value === "number") return Number.isFinite(value) ? String(value) : "";
  const text = String(value);
  const guarded = /^[=+\-@\t\r]/.test(text) ? `'${text}` : text;
  return /[",\r\n]/.test(guarded) ? `"${guarded.replaceAll('"', '""')}"` : guarded;
}

/** A whole file, header first, CRLF line ends. */
export function writeCsv(header: string[], rows: CsvValue[][]): string {
  return [header, ...rows].map((row) => row.map(csvCell).join(",")).join("\r\n") + "\r\n";
}

/** Hands a text to the person as a file. */
export function saveTextAs(fileName: string, text: string): void {
  const address = URL.createObjectURL(new Blob(["\uFEFF", text], { type: "text/csv;charset=utf-8" }));
  const link = document.createElement("a");
  link.href = address;
  link.download = fileName;
  link.click();
  // Later, because some browsers read the address after the click returns.
  setTimeout(() => URL.revokeObjectURL(address), 10_000);
}
