/** Dates in full: "14 October 2026". The day is the reader's own unless a zone is given. */
export function formatDay(instant: string | null, timeZone?: string): string {
  if (!instant) return "";
  return new Intl.DateTimeFormat("en-GB", { day: "numeric", month: "long", year: "numeric", timeZone }).format(
    new Date(instant),
  );
}

/** "14 October 2026, 16:05 UTC": the time names its zone. */
export function formatMoment(instant: string | null, timeZone?: string): string {
  if (!instant) return "";
  const time = new Intl.DateTimeFormat("en-GB", {
    hour: "2-digit",
    minute: "2-digit",
    timeZoneName: "short",
    timeZone,
  }).format(new Date(instant));
  return `${formatDay(instant, timeZone)}, ${time}`;
}

const BYTE_STEPS = ["bytes", "kB", "MB", "GB"];

/** "4.2 MB": decimal steps, as file managers show them. */
export function formatBytes(bytes: number): string {
  let value = bytes;
  let step = 0;
  while (value >= 1000 && step < BYTE_STEPS.length - 1) {
    value /= 1000;
    step++;
  }
  const digits = step === 0 || value >= 100 ? 0 : 1;
  return `${value.toFixed(digits)}\u202f${BYTE_STEPS[step]}`;
}
