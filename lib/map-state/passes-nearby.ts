import type { PassBody } from "@/lib/schemas/logs";

/** Numbers of passes, those nearest in time to the chosen one first, as long as together they hold at most so many records. */
export function passesNearby(
  passes: readonly Pick<PassBody, "pass" | "records">[],
  chosen: number | null,
  mostRecords: number,
): number[] {
  const at = Math.max(
    0,
    passes.findIndex(({ pass }) => pass === chosen),
  );
  const byDistance = [...passes.keys()].sort((a, b) => Math.abs(a - at) - Math.abs(b - at) || b - a);
  const near: number[] = [];
  let records = 0;
  for (const index of byDistance) {
    const { pass, records: more } = passes[index]!;
    records += more;
    if (records > mostRecords) break;
    near.push(pass);
  }
  return near;
}
