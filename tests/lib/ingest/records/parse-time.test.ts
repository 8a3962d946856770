import fc from "fast-check";
import { describe, expect, it } from "vitest";
import { createZoneClock, readLocalPattern } from "@/lib/ingest/records/local-time";
import { calendarToMs, gpsSecondsToMs, parseIsoTime } from "@/lib/ingest/records/parse-time";

describe("parseIsoTime", () => {
  it.each([
    ["2026-05-03T14:22:01Z", "2026-05-03T14:22:01.000Z", true],
    ["2026-05-03T14:22:01.250Z", "2026-05-03T14:22:01.250Z", true],
    ["2026-05-03T14:22:01,5+02:00", "2026-05-03T12:22:01.500Z", true],
    ["2026-05-03T14:22-0530", "2026-05-03T19:52:00.000Z", true],
    ["20260503T142201Z", "2026-05-03T14:22:01.000Z", true],
    ["2026-05-03 14:22:01", "2026-05-03T14:22:01.000Z", false],
  ])("reads %s", (text, iso, zoned) => {
    expect(parseIsoTime(text)).toEqual({ ms: Date.parse(iso), zoned });
  });

  it.each(["2026-13-01T00:00:00Z", "2026-02-29T00:00:00Z", "2026-05-03T24:00:00Z", "yesterday", "", "2026-05-03"])(
    "refuses %j",
    (text) => expect(parseIsoTime(text)).toBeNull(),
  );

  it("agrees with the platform's calendar", () => {
    fc.assert(
      fc.property(
        fc.date({ min: new Date("1901-01-01"), max: new Date("2099-12-31"), noInvalidDate: true }),
        (date) => {
          expect(parseIsoTime(date.toISOString())?.ms).toBe(date.getTime());
        },
      ),
    );
  });
});

describe("gpsSecondsToMs", () => {
  it("counts leap seconds", () => {
    // GPS time began 1980-01-06T00:00:00Z; 18 s ahead of UTC since 2017-01-01 (IERS Bulletin C, from memory).
    expect(gpsSecondsToMs(0)).toBe(Date.parse("1980-01-06T00:00:00Z"));
    expect(gpsSecondsToMs(1_167_264_018)).toBe(Date.parse("2017-01-01T00:00:00Z"));
    expect(gpsSecondsToMs(1_167_264_016)).toBe(Date.parse("2016-12-31T23:59:59Z"));
  });
});

describe("local times", () => {
  const read = (pattern: string, text: string) => {
    const time = readLocalPattern(pattern)?.parse(text);
    return time ? new Date(calendarToMs(time)).toISOString() : null;
  };

  it("reads patterns", () => {
    expect(read("dd/MM/yyyy HH:mm:ss", "03/05/2026 14:22:01")).toBe("2026-05-03T14:22:01.000Z");
    expect(read("MM/dd/yyyy hh:mm:ss a", "5/3/2026 12:05:00 AM")).toBe("2026-05-03T00:05:00.000Z");
    expect(read("dd MMM yyyy HH:mm", "3 May 2026 09:30")).toBe("2026-05-03T09:30:00.000Z");
    expect(read("dd.MM.yy HH:mm:ss.SSS", "03.05.26 14:22:01.25")).toBe("2026-05-03T14:22:01.250Z");
  });

  it("refuses what does not follow them", () => {
    expect(read("dd/MM/yyyy HH:mm", "05/13/2026 10:00")).toBeNull();
    expect(readLocalPattern("QQQ")).toBeNull();
    expect(readLocalPattern("MM/dd")).toBeNull();
  });

  it("turns wall clocks into UTC, also beside a change of the clock", () => {
    const chicago = createZoneClock("America/Chicago");
    const utc = (wall: string) => new Date(chicago?.toUtcMs(Date.parse(`${wall}Z`)) ?? NaN).toISOString();
    // IANA zone America/Chicago: UTC-5 in summer, UTC-6 in winter; on 2026-11-01 01:30 occurs twice, the first is summer time.
    expect(utc("2026-07-01T12:00:00")).toBe("2026-07-01T17:00:00.000Z");
    expect(utc("2026-01-15T12:00:00")).toBe("2026-01-15T18:00:00.000Z");
    expect(utc("2026-11-01T01:30:00")).toBe("2026-11-01T06:30:00.000Z");
    expect(utc("2026-11-01T02:30:00")).toBe("2026-11-01T08:30:00.000Z");
    expect(createZoneClock("Larkspur/Flats")).toBeNull();
  });
});
