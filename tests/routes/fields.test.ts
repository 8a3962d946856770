import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { adminDb } from "@/db/client";
import { makeWorld, SQUARE, type World } from "@/tests/support/make-world";

let world: World;
beforeAll(async () => {
  world = await makeWorld();
});
afterAll(async () => world.close());

async function addField(name: string, extra: Record<string, unknown> = {}): Promise<Record<string, unknown>> {
  return world.read("agronomist", { method: "POST", path: "/api/v1/fields", body: { name, ...extra }, expect: 201 });
}

function boundaryForm(bytes: string | Uint8Array, name: string): FormData {
  const form = new FormData();
  form.set("file", new File([typeof bytes === "string" ? bytes : new Uint8Array(bytes)], name));
  return form;
}

describe("fields", () => {
  it("gives the area on the ellipsoid and the address of what it made", async () => {
    const response = await world.as("owner", {
      method: "POST",
      path: "/api/v1/fields",
      body: { name: "North quarter", farm: "Larkspur Flats", boundary: SQUARE },
    });
    expect(response.status).toBe(201);
    const field = (await response.json()) as Record<string, unknown>;
    expect(response.headers.get("location")).toBe(`/api/v1/fields/${field.id}`);
    // Hand-worked: 0.01° of latitude (110 993.9 m/° at 38.505°) times 0.01° of longitude (87 233.2 m/°), WGS 84 series.
    expect(Number(field.areaM2) / (1109.939 * 872.332)).toBeCloseTo(1, 4);
    expect(field).toMatchObject({ farm: "Larkspur Flats", landowner: null, boundary: SQUARE, logCount: 0 });
    expect(field).toMatchObject({ newestLog: null, waitingLogs: 0 });
  });

  it("refuses a boundary that crosses itself and names the place", async () => {
    const bowtie = {
      type: "Polygon",
      coordinates: [
        [
          [-98, 38],
          [-97.9, 38.1],
          [-97.9, 38],
          [-98, 38.1],
          [-98, 38],
        ],
      ],
    };
    const problem = await world.read("owner", {
      method: "POST",
      path: "/api/v1/fields",
      body: { name: "Bow tie", boundary: bowtie },
      expect: 422,
    });
    expect(problem).toMatchObject({ code: "bad_boundary", status: 422 });
    expect(problem.detail).toContain("ring 1 crosses itself at longitude -97.95");
  });

  it("names every broken rule by its path", async () => {
    const problem = await world.read("owner", {
      method: "POST",
      path: "/api/v1/fields",
      body: {
        name: " ",
        boundary: {
          type: "Polygon",
          coordinates: [
            [
              [200, 38],
              [1, 2],
              [3, 4],
              [200, 38],
            ],
          ],
        },
      },
      expect: 422,
    });
    const paths = (problem.errors as { path: string }[]).map((error) => error.path);
    expect(paths).toContain("name");
    expect(paths.some((path) => path.startsWith("boundary.coordinates.0.0"))).toBe(true);
  });

  it("pages by name without losing or repeating one", async () => {
    for (const name of ["Page a", "Page b", "Page b", "Page c"]) await addField(name);
    const seen: string[] = [];
    let cursor = "";
    do {
      const page = await world.read("owner", { path: `/api/v1/fields?limit=2${cursor}` });
      seen.push(...(page.items as { id: string }[]).map((item) => item.id));
      cursor = page.nextCursor ? `&cursor=${String(page.nextCursor)}` : "";
    } while (cursor);
    const all = await world.read("owner", { path: "/api/v1/fields" });
    expect(seen).toEqual((all.items as { id: string }[]).map((item) => item.id));
    expect(new Set(seen).size).toBe(seen.length);
  });

  it("refuses a cursor it did not give", async () => {
    await world.read("owner", { path: "/api/v1/fields?cursor=abc", expect: 422 });
  });

  it("changes only what is named", async () => {
    const { id } = await addField("West draw", { farm: "Larkspur Flats", boundary: SQUARE });
    const path = `/api/v1/fields/${String(id)}`;
    const changed = await world.read("agronomist", { method: "PATCH", path, body: { landowner: "I. Hale" } });
    expect(changed).toMatchObject({
      name: "West draw",
      farm: "Larkspur Flats",
      landowner: "I. Hale",
      boundary: SQUARE,
    });
    const cleared = await world.read("agronomist", { method: "PATCH", path, body: { boundary: null } });
    expect(cleared).toMatchObject({ boundary: null, areaM2: null });
  });

  it("deletes a field and says 404 from then on", async () => {
    const { id } = await addField("Short life");
    const path = `/api/v1/fields/${String(id)}`;
    expect((await world.as("owner", { method: "DELETE", path })).status).toBe(204);
    await world.read("owner", { path, expect: 404 });
  });
});

describe("deleting a field that holds logs", () => {
  it("wants force, and then takes logs, files, shares and grants along", async () => {
    const { id } = await addField("With a log", { boundary: SQUARE });
    const path = `/api/v1/fields/${String(id)}`;
    const key = "organisations/org_larkspurflats/uploads/aa11";
    world.container.objects.set(key, new Uint8Array([1]));
    await adminDb().$client.query(
      `insert into logs (organisation_id, id, field_id, name, counts, file_name, file_bytes, sha256, status)
       values ('org_larkspurflats', 'log_forced', $1, 'l',
               '{"records":0,"rows":0,"readings":0,"flagged":0,"rejected":0,"passes":0}', 'a.csv', 1, 'aa11', 'failed')`,
      [id],
    );
    await adminDb().$client.query(
      `insert into log_files (organisation_id, log_id, part, file_name, file_bytes, sha256)
       values ('org_larkspurflats', 'log_forced', 0, 'a.csv', 1, 'aa11')`,
    );
    const share = {
      audience: "public",
      layers: ["boundary"],
      expiresAt: new Date(Date.now() + 86_400_000).toISOString(),
    };
    const { url } = await world.read("owner", { method: "POST", path: `${path}/shares`, body: share });
    const kept = await world.read("owner", { method: "DELETE", path, expect: 409 });
    expect(kept).toMatchObject({ code: "field_has_logs", logCount: 1 });
    await world.read("owner", { method: "DELETE", path: `${path}?force=yes`, expect: 422 });
    await world.read("owner", { method: "DELETE", path: `${path}?force=1`, expect: 204 });
    await world.read("owner", { path: "/api/v1/logs/log_forced", expect: 404 });
    expect(world.container.objects.has(key)).toBe(false);
    const token = String(url).split("/s/")[1];
    await world.read("stranger", { path: `/api/v1/shared/${token}`, expect: 404 });
  });
});

describe("boundary files", () => {
  it("are not read for a field that is not here", async () => {
    const { id } = await addField("Not theirs");
    const body = boundaryForm("<kml>".repeat(1000), "field.kml");
    const path = `/api/v1/fields/${String(id)}/boundary`;
    expect((await world.as("other-owner", { method: "PUT", path, body })).status).toBe(404);
  });

  const kml = (inside: string) => `<?xml version="1.0"?>${inside}`;
  const polygon =
    '<kml xmlns="http://www.opengis.net/kml/2.2"><Placemark><Polygon><outerBoundaryIs><LinearRing><coordinates>' +
    "-98.01,38.5,420 -98.0,38.5,420 -98.0,38.51,420 -98.01,38.51,420 -98.01,38.5,420" +
    "</coordinates></LinearRing></outerBoundaryIs></Polygon></Placemark></kml>";

  async function put(bytes: string | Uint8Array, name: string, expected: number) {
    const { id } = await addField("With a file");
    const path = `/api/v1/fields/${String(id)}/boundary`;
    return world.read("agronomist", { method: "PUT", path, body: boundaryForm(bytes, name), expect: expected });
  }

  it("takes GeoJSON, whatever wraps the polygon", async () => {
    const collection = { type: "FeatureCollection", features: [{ type: "Feature", properties: {}, geometry: SQUARE }] };
    expect(await put(JSON.stringify(collection), "field.geojson", 200)).toMatchObject({ boundary: SQUARE });
  });

  it("takes a GPX track that goes round, and says how far its ends lay apart", async () => {
    const points = [...SQUARE.coordinates[0]!.slice(0, 4), [-98.01, 38.5002]];
    const track = points.map(([lon, lat]) => `<trkpt lat="${lat}" lon="${lon}"><ele>420</ele></trkpt>`).join("");
    const text = `<gpx xmlns="http://www.topografix.com/GPX/1/1"><trk><trkseg>${track}</trkseg></trk></gpx>`;
    const field = (await put(kml(text), "edge.gpx", 200)) as {
      notes: string[];
      boundary: { coordinates: unknown[][] };
    };
    expect(field.notes).toEqual([expect.stringMatching(/^The ends of track 1 lay 22 m apart/)]);
    expect(field.boundary.coordinates[0]).toHaveLength(6);
    const way = text.replace(/<trkpt lat="38.5002".*?<\/trkpt>/, "");
    expect(await put(kml(way.replace(/(<trkpt.*?<\/trkpt>){1}/, "")), "way.gpx", 422)).toMatchObject({
      code: "no-polygon",
    });
  });

  it("counts ground that lies in two parts once, and says so", async () => {
    const shifted = SQUARE.coordinates.map((ring) => ring.map(([lon = 0, lat = 0]) => [lon + 0.005, lat]));
    const both = { type: "MultiPolygon", coordinates: [SQUARE.coordinates, shifted] };
    const one = (await put(JSON.stringify(SQUARE), "one.geojson", 200)) as { areaM2: number; notes: string[] };
    const two = (await put(JSON.stringify(both), "two.geojson", 200)) as { areaM2: number; notes: string[] };
    expect(one.notes).toEqual([]);
    expect(two.areaM2 / one.areaM2).toBeCloseTo(1.5, 6);
    expect(two.notes).toEqual([expect.stringMatching(/^Parts of the boundary overlap by \d{3},\d{3} m2/)]);
  });

  it("takes KML and drops its heights", async () => {
    expect(await put(kml(polygon), "field.kml", 200)).toMatchObject({ boundary: SQUARE });
  });

  it("refuses KML that declares entities, before reading it", async () => {
    const bomb = kml(`<!DOCTYPE kml [<!ENTITY a "aaaa"><!ENTITY b "&a;&a;&a;&a;">]>${polygon}`);
    expect(await put(bomb, "field.kml", 422)).toMatchObject({ code: "file-unsafe" });
  });

  it("refuses damaged XML, an empty file, points only, and an unknown kind", async () => {
    expect(await put(kml(polygon.slice(0, 200)), "field.kml", 422)).toMatchObject({ code: "file-damaged" });
    expect(await put("", "field.geojson", 422)).toMatchObject({ code: "empty-file" });
    const point = { type: "Feature", geometry: { type: "Point", coordinates: [-98, 38] }, properties: {} };
    expect(await put(JSON.stringify(point), "field.geojson", 422)).toMatchObject({ code: "no-polygon" });
    expect(await put("PDF-1.4", "field.pdf", 415)).toMatchObject({ code: "unknown-file-kind" });
  });

  it("takes the geometry itself as JSON and calls a malformed body malformed", async () => {
    const { id } = await addField("By JSON");
    const path = `/api/v1/fields/${String(id)}/boundary`;
    expect(await world.read("owner", { method: "PUT", path, body: SQUARE })).toMatchObject({ boundary: SQUARE });
    await world.read("owner", { method: "PUT", path, body: '{"type":', expect: 400 });
  });
});
