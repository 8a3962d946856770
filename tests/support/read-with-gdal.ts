import { execFileSync } from "node:child_process";

/** One feature as GDAL reads it. */
export interface GdalFeature {
  geometry: { type: string; coordinates: unknown } | null;
  properties: Record<string, string | number | null>;
}

/** What GDAL (Debian's gdal-bin) finds in a file: every feature of a layer, through its own GeoJSON writer. */
export function readWithGdal(path: string, layer?: string): GdalFeature[] {
  const parameters = ["-f", "GeoJSON", "-lco", "COORDINATE_PRECISION=12", "-lco", "SIGNIFICANT_FIGURES=17"];
  const text = runGdal("ogr2ogr", [...parameters, "/vsistdout/", path, ...(layer ? [layer] : [])]);
  return (JSON.parse(text) as { features: GdalFeature[] }).features;
}

/** What `ogrinfo -so -al` says; a warning fails the test. */
export function describeWithGdal(path: string): string {
  return runGdal("ogrinfo", ["-so", "-al", path]);
}

function runGdal(program: string, parameters: string[]): string {
  const env = { ...process.env, CPL_DEBUG: "OFF" };
  // A warning or error of GDAL comes on stderr while the exit code stays 0.
  const done = execFileSync("bash", ["-c", '"$0" "$@" 2>&1', program, ...parameters], { env, maxBuffer: 1 << 30 });
  const text = done.toString("utf8");
  const complaint = /^(?:Warning|ERROR) \d+: .*$/m.exec(text)?.[0];
  if (complaint) throw new Error(`${program}: ${complaint}`);
  return text;
}
