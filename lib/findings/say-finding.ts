import type { Finding } from "@/lib/findings/finding";
import type { UnitSystem } from "@/lib/units/display-unit";
import { formatQuantity } from "@/lib/units/format-quantity";

/** A share in words: whole percent, one decimal (unless it is 0) under 10 and over 99 %. */
export function sayShare(share: number): string {
  const percent = 100 * share;
  const fine = percent < 9.95 || percent > 99;
  return `${percent.toFixed(fine ? 1 : 0).replace(/\.0$/, "")}\u202f%`;
}

function sayValue({ value, unit }: { value: number; unit: string }, system: UnitSystem): string {
  if (unit === "fraction") return sayShare(value);
  if (unit === "1") return String(Math.round(value));
  return formatQuantity(value, unit, system).text;
}

/** Puts the numbers into a template, in the reader's units. A name without a value is left standing, so that it is seen. */
export function sayTemplate(template: string, values: Finding["values"], system: UnitSystem): string {
  return template.replace(/\{(\w+)\}/g, (whole, name: string) => {
    const value = values[name];
    return value ? sayValue(value, system) : whole;
  });
}

/** The sentence of a finding in the reader's units. */
export function sayFinding(finding: Pick<Finding, "sentenceTemplate" | "values">, system: UnitSystem): string {
  return sayTemplate(finding.sentenceTemplate, finding.values, system);
}
