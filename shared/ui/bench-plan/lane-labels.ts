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

/**
 * Places the labels of one row from left to right: each at its silhouette, else right of the look-in that is in its way;
 * without its tag where both do not fit; and before the next silhouette's label. Look-ins that still lie under a title
 * are named in `hidden`, to be left out.
 *
 * @param pegs places of the look-ins' heads, px
 */
export function placeLabels(
  row: readonly LabelInput[],
  pegs: readonly number[],
  width: number,
): { labels: PlacedLabel[]; hidden: number[] } {
  const sorted = [...pegs].sort((a, b) => a - b);
  const hidden: number[] = [];
  const leftOf = ({ x, title }: LabelInput) => Math.max(0, Math.min(x, width - labelWidth(title, null)));
  const labels = row.map((label, index): PlacedLabel => {
    const left = leftOf(label);
    const next = row[index + 1];
    const limit = next ? leftOf(next) - wordGap : width;
    const free = (x: number, wide: number) =>
      x + wide <= limit && sorted.every((peg) => peg + pegRoom <= x || peg - pegRoom >= x + wide);
    const starts = [left, ...sorted.filter((peg) => peg > left - pegRoom).map((peg) => peg + pegRoom)];
    for (const tag of label.tag === null ? [null] : [label.tag, null]) {
      const wide = labelWidth(label.title, tag);
      const x = starts.find((start) => free(start, wide));
      if (x !== undefined) return { x, title: label.title, tag, width: wide };
    }
    const wide = labelWidth(label.title, null);
    const x = left;
    hidden.push(...sorted.filter((peg) => peg + pegRoom > x && peg - pegRoom < x + wide));
    return { x, title: label.title, tag: null, width: wide };
  });
  return { labels, hidden };
}
