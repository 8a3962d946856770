import { existsSync, readFileSync } from "node:fs";
import { fileURLToPath } from "node:url";
import { describe, expect, it } from "vitest";
import { buildFixtures } from "@/tests/support/build-fixtures";

const ROOT = fileURLToPath(new URL("../../../fixtures/", import.meta.url));
const LARGEST_BYTES = 300_000;

describe("fixtures", () => {
  const fixtures = buildFixtures();
  const readme = readFileSync(`${ROOT}README.md`, "utf8");

  it.each(fixtures.map((fixture) => [fixture.folder, fixture] as const))(
    "%s is what the script writes",
    (_, fixture) => {
      const folder = `${ROOT}logs/${fixture.folder}`;
      const stored = readFileSync(`${folder}/${fixture.fileName}`);
      expect(stored.equals(Buffer.from(fixture.content))).toBe(true);
      expect(stored.length).toBeLessThan(LARGEST_BYTES);
      expect(readme).toContain(`logs/${fixture.folder}/${fixture.fileName}`);
      if (fixture.truth === null) expect(existsSync(`${folder}/truth.json`)).toBe(false);
      else expect(readFileSync(`${folder}/truth.json`, "utf8")).toBe(fixture.truth);
    },
  );
});
