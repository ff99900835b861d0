/** Whether every word that was typed stands in one of the texts; small and capital letters are alike. */
export function matchesAll(texts: readonly (string | null)[], typed: string): boolean {
  const all = texts.map((text) => (text ?? '').toLowerCase());
  return typed
    .toLowerCase()
    .split(/\s+/)
    .filter(Boolean)
    .every((word) => all.some((text) => text.includes(word)));
}
