/** Unique, trimmed names: a blank title becomes `column 5`, a second `speed` becomes `speed (2)`. */
export function nameColumns(titles: readonly string[]): string[] {
  const used = new Set<string>();
  return titles.map((title, index) => {
    const base = title.replace(/\s+/g, " ").trim().slice(0, 480) || `column ${index + 1}`;
    let name = base;
    for (let copy = 2; used.has(name); copy++) name = `${base} (${copy})`;
    used.add(name);
    return name;
  });
}
