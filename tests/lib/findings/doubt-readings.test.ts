import { describe, expect, it } from "vitest";
import { buildLog } from "@/lib/build/build-log";
import { passVerdict } from "@/lib/findings/pass-verdict";
import { LARKSPUR } from "@/lib/simulator/scenario/larkspur";
import { simulateSeedingLog } from "@/lib/simulator/simulate-seeding-log";
import { makeLog, makeSeeder, straightTrack } from "@/tests/support/make-log";

const EAST = simulateSeedingLog(LARKSPUR.fields[0]!.seeding.input);

/** The demo log with a channel read in pounds-force that was in newtons (NIST SP 811: 1 lbf = 4.4482216152605 N). */
function misread(...channels: string[]) {
  const { log, truth } = EAST;
  const made = log.channels.map((channel) =>
    channels.includes(channel.id)
      ? { ...channel, values: channel.values.map((value) => value * 4.4482216152605) }
      : channel,
  );
  const built = buildLog({ ...log, channels: made }, truth.options.machine);
  if (!built.ok) throw new Error(built.error.message);
  return passVerdict(built.value.placed);
}

/** Six rows whose force is `highN` on the first `share` of the way, else 1000 N, of at most 2000 N. */
function judge(highN: number, share: number) {
  const records = straightTrack({ from: [0, 0], headingDeg: 0, records: 401 });
  const value = (record: number) => (record < 401 * share ? highN : 1000);
  const log = makeLog({ records, rows: 6, channels: [{ id: "downforce", value }] });
  const built = buildLog(log, makeSeeder({ rowCount: 6, maxDownforceN: 2000 }));
  if (!built.ok) throw new Error(built.error.message);
  return passVerdict(built.value.placed).findings.some(({ kind }) => kind === "readings-doubtful");
}

describe("force beyond what the machine can apply", () => {
  it("is asked about before anything else, and nothing is concluded from it", () => {
    const verdict = misread("downforce");
    const [first] = verdict.findings;
    expect(first).toMatchObject({ kind: "readings-doubtful", severity: "look" });
    expect(first!.sentence).toMatch(
      /^Force readings reach \d\.\d times what this machine can apply\. Is the unit right\?$/,
    );
    expect(first!.check).toBe("Open the columns again and look at the unit.");
    expect(verdict.headline[0]).toBe("readings-doubtful");
    expect(verdict.rowsAtLimit).toEqual([]);
    expect(verdict.weight).toMatchObject({ state: "unknown", headroomN: null, shareLiftedM2: null });
    expect(verdict.findings.map(({ kind }) => kind)).not.toEqual(
      expect.arrayContaining([expect.stringMatching(/^(rows-at-limit|weight-|rows-side-by-side)/)]),
    );
    // The margin is what it was.
    expect(verdict.rowsStandingOut).toEqual([17]);
  });

  it("is so from a twentieth of the distance, 1.2 times over the limit", () => {
    expect(judge(2300, 1)).toBe(false);
    expect(judge(2500, 0.04)).toBe(false);
    expect(judge(2500, 0.06)).toBe(true);
  });

  it("is not found in a log read in its own unit", () => {
    expect(misread().findings.some(({ kind }) => kind === "readings-doubtful")).toBe(false);
  });
});

describe("margins many times the target", () => {
  it("hold no target", () => {
    const { log, truth } = EAST;
    const machine = { ...truth.options.machine, targetMarginN: 50 };
    const built = buildLog(log, machine);
    if (!built.ok) throw new Error(built.error.message);
    const verdict = passVerdict(built.value.placed);
    expect(verdict.findings[0]!.sentence).toMatch(
      /^Margin readings are typically \d+\.\d times this machine's target\./,
    );
    const kinds = verdict.findings.map(({ kind }) => kind);
    expect(kinds).not.toContain("target-held");
    expect(kinds).not.toContain("over-target");
    expect(kinds).not.toContain("rows-under-target");
  });

  it("are told of together with the force", () => {
    const { sentence } = misread("downforce", "margin").findings[0]!;
    expect(sentence).toContain("Force readings reach");
  });
});
