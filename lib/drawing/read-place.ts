/** "38.4102, -98.6145" or "38.4102 -98.6145": latitude first, as on every sign and phone. Null where it is no place. */
export function readPlace(text: string): [longitude: number, latitude: number] | null {
  const parts = text.trim().split(/\s*[,;]\s*|\s+/);
  if (parts.length !== 2 || parts.some((part) => !/^[+\-\u2212]?\d+(?:\.\d+)?°?$/.test(part))) return null;
  const [latitude = NaN, longitude = NaN] = parts.map((part) => Number(part.replace("\u2212", "-").replace("°", "")));
  return Math.abs(latitude) <= 85 && Math.abs(longitude) <= 180 ? [longitude, latitude] : null;
}
