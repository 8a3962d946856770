// Exits 0 when node_modules holds what package-lock.json asks for. Plain JavaScript: it runs before anything is installed.
import { existsSync, readFileSync } from "node:fs";

const installedPath = "node_modules/.package-lock.json";

function isCurrent() {
  if (!existsSync(installedPath)) return false;
  const wanted = JSON.parse(readFileSync("package-lock.json", "utf8")).packages;
  const installed = JSON.parse(readFileSync(installedPath, "utf8")).packages;
  return Object.entries(wanted).every(([path, entry]) => {
    // Optional packages are for one platform each; links have no version.
    if (path === "" || entry.optional || entry.devOptional || entry.peer || entry.link) return true;
    return installed[path]?.version === entry.version;
  });
}

process.exit(isCurrent() ? 0 : 1);
