/** Longest file worth reading: a recipe of 20,000 columns is about 3 MB. */
const MOST_BYTES = 10_000_000;

/** A file that holds no recipe, in words for the person. */
export class NoRecipeFile extends Error {}

/** The JSON in a file. @throws NoRecipeFile */
export async function readRecipeFile(file: File): Promise<unknown> {
  if (file.size > MOST_BYTES) throw new NoRecipeFile(`“${file.name}” is too large to be a recipe.`);
  try {
    return JSON.parse(await file.text());
  } catch {
    throw new NoRecipeFile(`“${file.name}” is no recipe: it cannot be read as JSON.`);
  }
}
