/** "Drill, pounds" at version 3 as `drill-pounds-v3.recipe.json`: safe as a file's name everywhere. */
export function nameRecipeFile({ name, version }: { name: string; version: number }): string {
  const words = name
    .normalize("NFKD")
    .toLowerCase()
    .replaceAll(/[^a-z0-9]+/g, "-")
    .replaceAll(/^-+|-+$/g, "")
    .slice(0, 60);
  return `${words || "columns"}-v${version}.recipe.json`;
}
