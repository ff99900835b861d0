/** Where everything stands on a label of 62 × 40 mm (look §12). Pure; millimetres, y of a text is its baseline. */

export const labelSize = { width: 62, height: 40 } as const;

export interface LabelInput {
  /** Repair, or the charge's number: the largest thing on it. */
  title: string;
  spare: string;
  /** 'module 5'; null: not known. */
  position: string | null;
  /** '2-series 66 Ah, to 3.964 V ±5 mV' */
  line: string;
  /** Volts of each group as printed, '3.966'. */
  volts: readonly string[];
  /** 'ready Tue 9 June 14:31, Ines' */
  ready: string;
}

export interface LabelText {
  key: string;
  text: string;
  x: number;
  y: number;
  size: number;
  weight: '500' | '600';
  align: 'start' | 'end';
}

export interface LabelLayout {
  texts: LabelText[];
  /** The rule between head and volts. */
  rule: { x0: number; x1: number; y: number; stroke: number };
  qr: { x: number; y: number; size: number };
  mark: { x: number; y: number; size: number };
}

const left = 3.2;
const right = 59.4;
/** Left edge of the head, beside the QR code of 24 mm. */
const head = 25.6;

/** Width of a text in Barlow Condensed 600, as a share of its size; measured means per kind of letter, to the wide side. */
export const widthShare = (text: string): number =>
  [...text].reduce((sum, letter) => {
    if (/\d/.test(letter)) return sum + 0.475;
    if (letter === ' ' || letter === '\u00a0') return sum + 0.22;
    if (/[-–.,:;'|ijlIt()]/.test(letter)) return sum + 0.3;
    return sum + (/[A-ZÄÖÜMWmw±]/.test(letter) ? 0.56 : 0.47);
  }, 0);

/** The size at which a text fits a width, mm; at most `most`. */
const fitted = (text: string, width: number, most: number): number =>
  Math.round(Math.min(most, width / widthShare(text)) * 100) / 100;

/** Over so many groups only the lowest and the highest stand on the label. */
const allBelow = 12;

interface Grid {
  columns: number;
  /** Size of the volts and of the names before them. */
  size: number;
  name: number;
  first: number;
  pitch: number;
}

/** Two columns for few groups; from five on four columns of smaller volts. */
function gridOf(count: number): Grid {
  if (count <= 2) return { columns: 2, size: 5.6, name: 3.2, first: 31.3, pitch: 0 };
  if (count <= 4) return { columns: 2, size: 4.2, name: 2.6, first: 29.2, pitch: 4.1 };
  return { columns: 4, size: 3.4, name: 2.2, first: count <= 8 ? 29.4 : 28.5, pitch: count <= 8 ? 3.9 : 3.4 };
}

function voltTexts(volts: readonly string[]): LabelText[] {
  const named = volts.map((text, group) => ({ name: `G${group + 1}`, text }));
  const byVolts = [...named].sort((a, b) => Number(a.text.replace(',', '.')) - Number(b.text.replace(',', '.')));
  const many = named.length > allBelow;
  const shown = many
    ? [
        { ...byVolts[0]!, name: `low ${byVolts[0]!.name}` },
        { ...byVolts.at(-1)!, name: `high ${byVolts.at(-1)!.name}` },
      ]
    : named;
  const grid = gridOf(shown.length);
  const columnWidth = (right - left) / grid.columns;
  return shown.flatMap(({ name, text }, index) => {
    const x = left + (index % grid.columns) * columnWidth;
    const y = grid.first + Math.floor(index / grid.columns) * grid.pitch;
    const after = x + widthShare(`${name} `) * grid.name;
    const common = { y, align: 'start' as const };
    return [
      { ...common, key: `${name}n`, text: name, x, size: grid.name, weight: '500' as const },
      { ...common, key: `${name}v`, text, x: after, size: grid.size, weight: '600' as const },
      ...(grid.columns === 2
        ? [
            {
              ...common,
              key: `${name}u`,
              text: 'V',
              x: after + (widthShare(text) + 0.12) * grid.size,
              size: grid.name,
              weight: '500' as const,
            },
          ]
        : []),
    ];
  });
}

/** Every mark of the label. */
export function layoutLabel({ title, spare, position, line, volts, ready }: LabelInput): LabelLayout {
  const wide = right - head;
  const pair = `${spare}  ${position ?? ''}`;
  const pairSize = fitted(pair, wide, 5);
  const crowded = volts.length > 4 && volts.length <= allBelow;
  const markSize = crowded ? 3.8 : 6.4;
  const mark = { x: right - markSize, y: crowded ? 35.4 : 32.4, size: markSize };
  const text = (
    key: string,
    words: string,
    x: number,
    y: number,
    size: number,
    more: Partial<LabelText> = {},
  ): LabelText => ({
    key,
    text: words,
    x,
    y,
    size,
    weight: '600',
    align: 'start',
    ...more,
  });
  return {
    texts: [
      text('title', title, head - 0.4, 13.6, fitted(title, wide, 13)),
      text('spare', spare, head, 20.2, pairSize),
      ...(position === null ? [] : [text('position', position, right, 20.2, pairSize, { align: 'end' })]),
      text('line', line, head, 23.7, fitted(line, wide, 2.8), { weight: '500' }),
      ...voltTexts(volts),
      text('ready', ready, left, crowded ? 39 : 37.3, fitted(ready, mark.x - left - 1.5, crowded ? 3 : 3.9)),
    ],
    rule: { x0: left, x1: right, y: 25.2, stroke: 0.35 },
    qr: { x: 0.6, y: 0.6, size: 24 },
    mark,
  };
}
