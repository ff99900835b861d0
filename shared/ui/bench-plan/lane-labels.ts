/** Where the words over the silhouettes of a lane stand, so that none runs into another or under a look-in. */

/** px of a small bold and a small letter; a little more than the face takes, so that words keep apart in every browser. */
const boldLetter = 7.5;
const letter = 7;
const wordGap = 8;
/** A look-in's head with its air to both sides, px. */
const pegRoom = 12;

export interface LabelInput {
  /** Left end of its silhouette, px; may lie left of the lane. */
  x: number;
  title: string;
  /** 'check due', '22 min over'; null: none. */
  tag: string | null;
  /** The tag says that somebody is needed: look-ins that are done give way to it. */
  needed?: boolean;
}
export interface PlacedLabel {
  x: number;
  title: string;
  tag: string | null;
  width: number;
}

/** How wide a title with its tag is, px. */
export const labelWidth = (title: string, tag: string | null): number =>
  title.length * boldLetter + (tag === null ? 0 : wordGap + tag.length * letter);

/** A name stands at most this far from the begin of its silhouette, px; before that look-ins give way to it. */
const farthest = { before: 24, after: 80 } as const;

/**
 * Places the labels of one row from left to right: each at its silhouette, else as near beside the look-in that is in its
 * way; without its tag where both do not fit; and clear of the labels beside it. Look-ins that still lie under a title, and
 * those done that lie under a tag that is needed, are named in `hidden`, to be left out.
 *
 * @param pegs places of the look-ins' heads, px
 * @param done those of them whose look-in is done
 */
export function placeLabels(
  row: readonly LabelInput[],
  pegs: readonly number[],
  width: number,
  done: readonly number[] = [],
): { labels: PlacedLabel[]; hidden: number[] } {
  const hidden: number[] = [];
  const leftOf = ({ x, title }: LabelInput) => Math.max(0, Math.min(x, width - labelWidth(title, null)));
  let lastEnd = -wordGap;
  const labels = row.map((label, index): PlacedLabel => {
    const left = leftOf(label);
    const next = row[index + 1];
    const limit = next ? leftOf(next) - wordGap : width;
    const under = (peg: number, x: number, wide: number) => peg + pegRoom > x && peg - pegRoom < x + wide;
    const apart = (x: number, wide: number) =>
      x >= Math.max(0, lastEnd + wordGap, left - farthest.before) && x <= left + farthest.after && x + wide <= limit;
    const free = (x: number, wide: number, inTheWay = pegs) =>
      apart(x, wide) && !inTheWay.some((peg) => under(peg, x, wide));
    for (const tag of label.tag === null ? [null] : [label.tag, null]) {
      const wide = labelWidth(label.title, tag);
      const starts = [left, ...pegs.flatMap((peg) => [peg + pegRoom, peg - pegRoom - wide])];
      const [x] = starts.filter((start) => free(start, wide)).sort((a, b) => Math.abs(a - left) - Math.abs(b - left));
      const open = pegs.filter((peg) => !done.includes(peg));
      const over = x === undefined && label.needed && tag !== null && free(left, wide, open) ? left : x;
      if (over === undefined) continue;
      hidden.push(...pegs.filter((peg) => under(peg, over, wide)));
      lastEnd = over + wide;
      return { x: over, title: label.title, tag, width: wide };
    }
    const wide = labelWidth(label.title, null);
    hidden.push(...pegs.filter((peg) => under(peg, left, wide)));
    lastEnd = left + wide;
    return { x: left, title: label.title, tag: null, width: wide };
  });
  return { labels, hidden };
}
