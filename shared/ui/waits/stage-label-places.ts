/** Room for a stage's name and its time, px. */
const labelWidth = 92;

/**
 * Where the labels of stages stand: under the beginning of each, pushed to the right by the one before and to the left
 * by the end. Null where there is no room for all of them.
 */
export function stageLabelPlaces(begins: readonly number[], width: number): number[] | null {
  if (width < begins.length * labelWidth) return null;
  const places: number[] = [];
  begins.forEach((begin, i) => places.push(i === 0 ? begin : Math.max(begin, (places[i - 1] ?? 0) + labelWidth)));
  for (let i = places.length - 1; i >= 0; i--)
    places[i] = Math.min(places[i] ?? 0, width - (places.length - i) * labelWidth);
  return places;
}
