import { afterAll, beforeAll, beforeEach, describe, expect, it } from "vitest";
import { adminDb } from "@/db/client";
import { SharedView } from "@/lib/schemas/shared";
import { callApi } from "@/tests/support/call-api";
import { makeWorld, SQUARE, type World } from "@/tests/support/make-world";

const LARKSPUR = "org_larkspurflats";
const SOON = () => new Date(Date.now() + 7 * 86_400_000).toISOString();
let world: World;
let fieldId: string;

const channel = (id: string) => ({ id, unit: "N", min: 0, max: 2000, perRow: true });
const finding = {
  id: "f1",
  kind: "row",
  severity: "look",
  sentence: "Row 7 ran light.",
  value: 1,
  unit: "N",
  interval: null,
  confidence: "fair",
  method: "median",
  place: { type: "Point", coordinates: [-98.005, 38.505] },
  check: "Look at the opener.",
  caution: null,
};
const lack = {
  ...finding,
  id: "f2",
  kind: "cannot-judge",
  sentence: "The machine has no target margin.",
  place: null,
  check: "Complete the machine's description.",
};
const verdict = {
  rowsUnderTarget: [7],
  rowsAtLimit: [],
  weight: { headroomN: null, shareLiftedM2: null, state: "unknown" },
  known: { underTarget: true, atLimit: false },
  findings: [finding, lack],
  inner: "not part of the reply's schema",
};
const coverage = { sweptM2: 10, coveredM2: 9, overlapM2: 1, skippedM2: 0, resolutionM: 0.25 };

/** A built log of the field, as the worker leaves it. */
async function addLog(kind = "seeding"): Promise<string> {
  const id = `log_share${Math.random().toString(36).slice(2, 10)}`;
  await adminDb().$client.query(
    `insert into logs (organisation_id, id, field_id, name, kind, counts, channels, file_name, file_bytes, sha256,
                       status, version, bbox)
     values ($1, $2, $3, 'Drill log', $4, '{"records":10,"rows":24,"readings":240,"flagged":0,"rejected":0,"passes":2}',
             $5, 'a.csv', 1, $2, 'ready', 1, '[-98.01,38.5,-98,38.51]')`,
    [LARKSPUR, id, fieldId, kind, JSON.stringify([channel("downforce"), channel("margin"), channel("depth")])],
  );
  for (const [name, body] of [
    ["verdict", verdict],
    ["coverage", coverage],
  ]) {
    await adminDb().$client.query(
      "insert into log_results (organisation_id, log_id, version, kind, body) values ($1, $2, 1, $3, $4)",
      [LARKSPUR, id, name, JSON.stringify(body)],
    );
  }
  return id;
}

async function share(body: Record<string, unknown>, expected = 201): Promise<Record<string, string>> {
  const whole = { audience: "landowner", layers: ["boundary"], expiresAt: SOON(), ...body };
  const call = { method: "POST", path: `/api/v1/fields/${fieldId}/shares`, body: whole, expect: expected };
  return (await world.read("agronomist", call)) as Record<string, string>;
}

const tokenOf = (made: Record<string, string>) => made.url!.split("/s/")[1]!;
const open = (token: string, extra: Record<string, unknown> = {}) =>
  callApi({ path: `/api/v1/shared/${token}`, ...extra });

beforeAll(async () => {
  world = await makeWorld();
});
afterAll(async () => world.close());
beforeEach(async () => {
  const body = { name: "Shared field", landowner: "I. Hale", farm: "Larkspur Flats", boundary: SQUARE };
  fieldId = String((await world.read("owner", { method: "POST", path: "/api/v1/fields", body })).id);
});

describe("making a share", () => {
  it("gives an address of at least 128 random bits, once, and keeps only its hash", async () => {
    const made = await share({});
    expect(made.url).toMatch(/^http:\/\/localhost:3000\/s\//);
    const token = tokenOf(made);
    expect(Buffer.from(token, "base64url").length * 8).toBeGreaterThanOrEqual(128);
    const { rows } = await adminDb().$client.query("select * from shares");
    expect(JSON.stringify(rows)).not.toContain(token);
    const listed = await world.read("owner", { path: `/api/v1/fields/${fieldId}/shares` });
    expect(JSON.stringify(listed)).not.toContain(token);
    expect(listed).toMatchObject({ items: [{ id: made.id, state: "open", openedCount: 0, hasPasscode: false }] });
  });

  it("ends in the future, within two years", async () => {
    for (const expiresAt of ["2020-01-01T00:00:00Z", new Date(Date.now() + 800 * 86_400_000).toISOString(), "soon"]) {
      const problem = await share({ expiresAt }, 422);
      expect(problem.errors).toMatchObject([{ path: "expiresAt" }]);
    }
  });

  it("refuses what is not built, layers it does not know, and a log of another field", async () => {
    expect((await share({ allowDownload: true }, 422)).detail).toContain("not built yet");
    await share({ layers: [] }, 422);
    await share({ layers: ["yield"] }, 422);
    await share({ logId: "log_elsewhere" }, 422);
  });

  it("mails the link when asked, and says whether it left", async () => {
    const made = await share({ emailTo: "hale@larkspur.example" });
    expect(made.emailed).toBe(true);
    expect(world.container.sentMail.at(-1)).toMatchObject({ to: "hale@larkspur.example" });
    expect(world.container.sentMail.at(-1)?.text).toContain(made.url);
    const send = world.container.mailer.send;
    world.container.mailer.send = async () => {
      throw new Error("the mail server is away");
    };
    const unsent = await share({ emailTo: "hale@larkspur.example" });
    world.container.mailer.send = send;
    expect(unsent).toMatchObject({ emailed: false });
    expect((await open(tokenOf(unsent))).status).toBe(200);
  });

  it("stops a person after twenty mails in an hour, before a share is made", async () => {
    const statuses = [];
    for (let i = 0; i < 22; i++) {
      const body = { audience: "landowner", layers: ["boundary"], expiresAt: SOON(), emailTo: "hale@larkspur.example" };
      const path = `/api/v1/fields/${fieldId}/shares`;
      statuses.push((await world.as("owner", { method: "POST", path, body })).status);
    }
    expect(statuses.slice(0, 20)).toEqual(Array.from({ length: 20 }, () => 201));
    expect(statuses.slice(20)).toEqual([429, 429]);
    const listed = await world.read("owner", { path: `/api/v1/fields/${fieldId}/shares` });
    expect(listed.items).toHaveLength(20);
    expect(await share({})).toMatchObject({ emailed: null });
  });

  it("fixes the log when it is made: a later harvest does not show", async () => {
    const logId = await addLog();
    await addLog("harvest");
    expect(await share({})).toMatchObject({ logId });
  });
});

describe("opening a share", () => {
  it("shows the shared layers and strictly nothing else", async () => {
    const logId = await addLog();
    const token = tokenOf(await share({ layers: ["downforce"], logId }));
    const text = await (await open(token)).text();
    const view = SharedView.parse(JSON.parse(text));
    expect(view).toMatchObject({
      fieldName: "Shared field",
      boundary: null,
      areaM2: null,
      verdict: null,
      coverage: null,
    });
    expect(view.log?.channels.map((one) => one.id)).toEqual(["downforce"]);
    for (const secret of [
      "I. Hale",
      "Larkspur Flats farm",
      logId,
      fieldId,
      LARKSPUR,
      "a.csv",
      "margin",
      "Row 7",
      "98.005",
    ]) {
      expect(text).not.toContain(secret);
    }
  });

  it("shows boundary, verdict and areas where they were shared", async () => {
    const logId = await addLog();
    const token = tokenOf(await share({ layers: ["boundary", "verdict", "coverage"], logId }));
    const view = SharedView.parse(await (await open(token)).json());
    expect(view.boundary).toEqual(SQUARE);
    expect(view.coverage).toEqual(coverage);
    expect(view.verdict?.findings[0]).toMatchObject({ sentence: "Row 7 ran light.", place: finding.place });
    expect(view.verdict).not.toHaveProperty("inner");
    expect(view.log?.channels).toEqual([]);
  });

  it("leaves out, for a landowner only, what the machine's description lacks", async () => {
    const logId = await addLog();
    const view = async (audience: string) => {
      const token = tokenOf(await share({ audience, layers: ["verdict"], logId }));
      return SharedView.parse(await (await open(token)).json()).verdict;
    };
    const landowner = await view("landowner");
    expect(landowner?.findings.map((one) => one.id)).toEqual(["f1"]);
    expect(landowner?.known).toEqual({ underTarget: true, atLimit: false });
    expect((await view("adviser"))?.findings.map((one) => one.id)).toEqual(["f1", "f2"]);
  });

  it("counts openings, and keeps search engines' and other sites' hands off", async () => {
    const made = await share({});
    const response = await open(tokenOf(made));
    await open(tokenOf(made));
    expect(response.headers.get("referrer-policy")).toBe("no-referrer");
    expect(response.headers.get("cache-control")).toContain("no-store");
    const kept = await world.read("owner", { path: `/api/v1/shares/${made.id}` });
    expect(kept.openedCount).toBe(2);
    expect(kept.lastOpenedAt).not.toBeNull();
  });

  it("says 404 to an unknown link and 410 to one that ended", async () => {
    expect((await open("nothing-of-the-kind")).status).toBe(404);
    const made = await share({});
    await world.read("agronomist", { method: "DELETE", path: `/api/v1/shares/${made.id}`, expect: 204 });
    await world.read("agronomist", { method: "DELETE", path: `/api/v1/shares/${made.id}`, expect: 204 });
    const withdrawn = await open(tokenOf(made));
    expect([withdrawn.status, ((await withdrawn.json()) as { code: string }).code]).toEqual([410, "share_revoked"]);
    const late = await share({});
    world.container.setNow(new Date(Date.now() + 8 * 86_400_000));
    const expired = await open(tokenOf(late));
    world.container.setNow(null);
    expect([expired.status, ((await expired.json()) as { code: string }).code]).toEqual([410, "share_expired"]);
  });

  it("slows down who guesses links", async () => {
    const headers = { "x-forwarded-for": "203.0.113.9" };
    const statuses = [];
    for (let i = 0; i < 32; i++) statuses.push((await open(`guess${i}`, { headers })).status);
    expect(statuses.slice(30)).toEqual([429, 429]);
  });

  it("draws tiles of shared channels only", async () => {
    const logId = await addLog();
    const token = tokenOf(await share({ layers: ["downforce"], logId }));
    const tile = (id: string) => callApi({ path: `/api/v1/shared/${token}/tiles/${id}/15/7000/12000.png` });
    for (const hidden of ["margin", "depth", "resistance", "yieldMass"]) expect((await tile(hidden)).status).toBe(404);
    const other = tokenOf(await share({ layers: ["boundary"], logId }));
    const response = await callApi({ path: `/api/v1/shared/${other}/tiles/downforce/tiles.json` });
    expect(response.status).toBe(404);
  });
});

describe("a passcode", () => {
  const give = (token: string, passcode: string) =>
    callApi({ method: "POST", path: `/api/v1/shared/${token}/passcode`, body: { passcode } });

  it("is asked for, checked, and remembered by a cookie of this link", async () => {
    const token = tokenOf(await share({ passcode: "meadow-17" }));
    const asked = await open(token);
    expect([asked.status, ((await asked.json()) as { code: string }).code]).toEqual([401, "passcode_required"]);
    expect((await give(token, "meadow-18")).status).toBe(401);
    const right = await give(token, "meadow-17");
    expect(right.status).toBe(204);
    const cookie = right.headers.getSetCookie()[0]!;
    expect(cookie).toMatch(/HttpOnly; SameSite=Lax/);
    expect((await open(token, { cookie: cookie.split(";")[0] })).status).toBe(200);
    const other = tokenOf(await share({ passcode: "meadow-17" }));
    expect((await open(other, { cookie: cookie.split(";")[0] })).status).toBe(401);
  });

  it("cannot be guessed at leisure", async () => {
    const token = tokenOf(await share({ passcode: "0417" }));
    let last = 0;
    for (let i = 0; i < 22; i++) last = (await give(token, `100${i}`)).status;
    expect(last).toBe(429);
    expect((await give(token, "0417")).status).toBe(429);
  });
});

describe("a blurred location", () => {
  it("keeps shape and size, and tells nowhere where the field is", async () => {
    const logId = await addLog();
    const token = tokenOf(await share({ layers: ["boundary", "verdict", "downforce"], logId, blurLocation: true }));
    const text = await (await open(token)).text();
    const view = SharedView.parse(JSON.parse(text));
    const withoutTimes = text.replaceAll(/\d{4}-\d\d-\d\dT[\d:.]+Z/g, "");
    expect(withoutTimes).not.toMatch(/38\.5|98\.0/);
    expect(view.log?.bbox).toBeNull();
    const [ring] = (view.boundary as unknown as typeof SQUARE).coordinates;
    expect(ring![0]).toEqual([0, 0]);
    // Hand-worked: 0.01° of latitude at 38.505° is 1109.94 m, and 1109.94 m are 0.010038° at the equator (110 574 m/°).
    expect(ring![2]![1]).toBeCloseTo(0.010038, 5);
    const place = view.verdict?.findings[0]?.place as unknown as { coordinates: number[] };
    expect(place.coordinates[1]).toBeCloseTo(0.005019, 5);
    const tile = await callApi({ path: `/api/v1/shared/${token}/tiles/downforce/15/7000/12000.png` });
    expect(tile.status).toBe(404);
  });
});
