/** Where the pack picture stands: pure, px in the drawing's own box. Volts in V. */

/** Over this many groups a picture is drawn by module. */
export const BARS_AT_MOST = 120;
/** The paler strip around the median, V: what groups of a good pack lie within (common practice). */
export const STRIP_VOLTS = 0.008;

export interface PackDrawing {
  /** One path each: all healthy groups, all odd ones. */
  healthy: string;
  odd: string;
  /** Height of the break in every bar's foot; null: strips stand free, nothing is cut. */
  breakY: number | null;
  strip: { y: number; height: number };
  medianY: number;
  /** Middle of the worst odd module; null: nothing is odd. */
  callX: number | null;
  ticks: { x: number; text: string; anchor: 'start' | 'middle' | 'end' }[];
}

/** Groups of a module position, 0-based. */
export interface ModuleGroups {
  position: string;
  groups: number[];
}

/** Groups by their module, in the order in which the modules come first. */
export function byModule(positions: readonly string[]): ModuleGroups[] {
  const found = new Map<string, number[]>();
  positions.forEach((position, group) => {
    const groups = found.get(position);
    if (groups) groups.push(group);
    else found.set(position, [group]);
  });
  return [...found].map(([position, groups]) => ({ position, groups }));
}

const two = (value: number): string => String(Math.round(value * 100) / 100);
const box = (x: number, y: number, width: number, height: number): string =>
  `M${two(x)} ${two(y)}h${two(width)}v${two(height)}h${two(-width)}z`;

/** First, last and three between; of few every one. */
function ticksOf(count: number, pitch: number, name: (index: number) => string): PackDrawing['ticks'] {
  const places =
    count <= 5
      ? Array.from({ length: count }, (_, i) => i)
      : [0, 1, 2, 3, 4].map((part) => Math.max(0, Math.round((part * count) / 4) - 1));
  return places.map((index, i) => ({
    x: i === 0 ? 0 : i === places.length - 1 ? count * pitch : (index + 0.5) * pitch,
    text: name(index),
    anchor: i === 0 ? 'start' : i === places.length - 1 ? 'end' : 'middle',
  }));
}

/**
 * Bars from a broken foot, one for each group; over 120 groups a strip for each module, from its lowest to its highest.
 * The picture of 400 groups is two paths.
 *
 * @param odd odd groups, 0-based, the worst module's among them
 * @param worst groups of the module that is called out
 */
export function layoutPack({
  groupVolts,
  odd,
  worst = [],
  positions,
  medianVolts,
  width,
  height,
}: {
  groupVolts: readonly number[];
  odd: readonly number[];
  worst?: readonly number[];
  positions: readonly string[];
  medianVolts: number;
  width: number;
  height: number;
}): PackDrawing {
  const low = Math.min(...groupVolts, medianVolts - STRIP_VOLTS);
  const high = Math.max(...groupVolts, medianVolts + STRIP_VOLTS);
  const [foot, top] = [low - (high - low) * 0.3, high + (high - low) * 0.06];
  const y = (volts: number) => ((top - volts) / (top - foot)) * height;
  const wrong = new Set(odd);
  const bars = groupVolts.length <= BARS_AT_MOST;
  const columns: ModuleGroups[] = bars
    ? groupVolts.map((_, group) => ({ position: String(group), groups: [group] }))
    : byModule(positions);
  const pitch = width / columns.length;
  const wide = pitch > 3 ? pitch - 1.2 : pitch * 0.75;
  const drawn = { healthy: '', odd: '' };
  columns.forEach(({ groups }, index) => {
    const volts = groups.map((group) => groupVolts[group] ?? medianVolts);
    const above = y(Math.max(...volts));
    const below = bars ? height : Math.max(above + 3, y(Math.min(...volts)));
    const kind = groups.some((group) => wrong.has(group)) ? 'odd' : 'healthy';
    drawn[kind] += box(index * pitch, above, wide, below - above);
  });
  const called = columns.flatMap(({ groups }, index) => (groups.some((group) => worst.includes(group)) ? [index] : []));
  const stripTop = y(medianVolts + STRIP_VOLTS);
  return {
    ...drawn,
    breakY: bars ? height - 11 : null,
    strip: { y: stripTop, height: y(medianVolts - STRIP_VOLTS) - stripTop },
    medianY: y(medianVolts),
    callX: called.length === 0 ? null : (((called[0] ?? 0) + (called.at(-1) ?? 0)) / 2) * pitch + wide / 2,
    ticks: ticksOf(columns.length, pitch, (index) => (bars ? `G${index + 1}` : (columns[index]?.position ?? ''))),
  };
}
