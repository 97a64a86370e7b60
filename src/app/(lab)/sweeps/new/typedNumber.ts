/** A number as a person types it, with a point or a comma; null when it is none. */
export function typedNumber(text: string): number | null {
  const trimmed = text.trim().replace(',', '.').replace('\u2212', '-');
  if (!/^-?(\d+\.?\d*|\.\d+)$/.test(trimmed)) return null;
  return Number(trimmed);
}
