import axe from "axe-core";
import type { Page } from "playwright-core";

/**
 * Handles on the histogram may lie close together. The same edges stand in fields of full size beside it, which WCAG 2.2
 * allows (2.5.8, "Equivalent").
 */
const CLOSE_HANDLES = '[aria-label^="Class edge"]';

/** Faults that axe finds and calls serious or critical, by rule and place; best practices count too. */
export async function findGraveFaults(page: Page): Promise<string[]> {
  await page.evaluate(axe.source);
  return page.evaluate(async (handles) => {
    const runner = (window as unknown as { axe: typeof import("axe-core") }).axe;
    const tags = ["wcag2a", "wcag2aa", "wcag21a", "wcag21aa", "wcag22aa", "best-practice"];
    const { violations } = await runner.run(document, { runOnly: { type: "tag", values: tags } });
    return violations
      .filter(({ impact }) => impact === "serious" || impact === "critical")
      .map(({ id, nodes }) => ({
        id,
        nodes: nodes.filter(
          ({ target }) => id !== "target-size" || !document.querySelector(target.join(" "))?.matches(handles),
        ),
      }))
      .filter(({ nodes }) => nodes.length > 0)
      .map(({ id, nodes }) => `${id}: ${nodes.map((node) => node.target.join(" ")).join(", ")}`);
  }, CLOSE_HANDLES);
}
