/** Where a column stands decides how large its vessels are. */
export type ColumnPlace = 'list' | 'live' | 'check' | 'wall';

export interface ColumnSize {
  /** Vessel width, gap and height, px. */
  w: number;
  gap: number;
  h: number;
  stroke: number;
}

const first: Record<ColumnPlace, ColumnSize> = {
  list: { w: 14, gap: 5, h: 60, stroke: 1.5 },
  live: { w: 36, gap: 12, h: 176, stroke: 2 },
  check: { w: 62, gap: 18, h: 176, stroke: 2 },
  wall: { w: 34, gap: 10, h: 112, stroke: 2.5 },
};
/** The most groups a vessel size is drawn for, and the next one. */
const narrower: Record<ColumnPlace, readonly (readonly [number, { w: number; gap: number }])[]> = {
  list: [[4, { w: 9, gap: 3 }]],
  live: [[4, { w: 18, gap: 6 }]],
  check: [
    [3, { w: 36, gap: 12 }],
    [5, { w: 18, gap: 6 }],
  ],
  wall: [[4, { w: 18, gap: 6 }]],
};

/** Over so many groups the vessels are 6 wide and 2 apart; over twice as many only three are drawn. */
export const slimAbove = 8;
export const threeAbove = 16;

/** The size of a column's vessels; `change` overrides single measures. */
export function columnSize(place: ColumnPlace, groupCount: number, change: Partial<ColumnSize> = {}): ColumnSize {
  const drawn = groupCount > threeAbove ? 3 : groupCount;
  let size = first[place];
  for (const [above, slim] of narrower[place]) if (drawn > above) size = { ...size, ...slim };
  if (drawn > slimAbove) size = { ...size, w: 6, gap: 2 };
  return { ...size, ...change };
}
