// Writes every simulated file under fixtures/logs and its list in fixtures/README.md: npx tsx tests/support/regenerate.ts
import { existsSync, mkdirSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { dirname, join } from "node:path";
import { fileURLToPath } from "node:url";
import { buildFixtures, type Fixture } from "@/tests/support/build-fixtures";

const ROOT = join(dirname(fileURLToPath(import.meta.url)), "../../fixtures");
const OWN_FOLDERS = ["csv", "geojson", "shapefile", "iso11783", "bad"];
/** Only what stands between these belongs to this script. */
const LIST_START = "<!-- simulated logs: written by tests/support/regenerate.ts -->";
const LIST_END = "<!-- end of simulated logs -->";

const fixtures = buildFixtures();
for (const folder of OWN_FOLDERS) rmSync(join(ROOT, "logs", folder), { recursive: true, force: true });
fixtures.forEach(writeFixture);
writeList(fixtures);

function writeFixture(fixture: Fixture): void {
  const folder = join(ROOT, "logs", fixture.folder);
  mkdirSync(folder, { recursive: true });
  writeFileSync(join(folder, fixture.fileName), fixture.content);
  if (fixture.truth !== null) writeFileSync(join(folder, "truth.json"), fixture.truth);
}

function writeList(all: readonly Fixture[]): void {
  const file = join(ROOT, "README.md");
  const before = existsSync(file) ? readFileSync(file, "utf8") : `# Fixtures\n\n${LIST_START}${LIST_END}\n`;
  const [head = "", rest = ""] = before.split(LIST_START);
  const tail = rest.split(LIST_END)[1] ?? "\n";
  writeFileSync(file, head + LIST_START + listFixtures(all) + LIST_END + tail);
}

function listFixtures(all: readonly Fixture[]): string {
  const lines = all.map(({ folder, fileName, story }) => `- \`logs/${folder}/${fileName}\`: ${story}`);
  return [
    "",
    "",
    "Everything here is made by the simulator (`lib/simulator`), so every name and place is invented and the truth is known:",
    "`truth.json` beside a file holds it in SI units, weighted as the API states. The seeding files hold one and the same",
    "log. Make them again with `npx tsx tests/support/regenerate.ts`.",
    "",
    ...lines,
    "",
    "",
  ].join("\n");
}
