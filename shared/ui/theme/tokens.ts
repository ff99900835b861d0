/**
 * Every colour, size and time of the look, once. Components take colours by role from the theme, never by hue.
 *
 * `paper` is the light theme (phone, desk), `night` the dark one (wall; offered on the phone).
 */

const paper = {
  ground: '#F2ECDF',
  sheet: '#FBF8F1',
  well: '#E5DCCA',
  line: '#CDC1AB',
  edge: '#857A67',
  ink: '#1C1A15',
  ink2: '#4A4438',
  ink3: '#625A4B',
  onInk: '#FBF8F1',
  charging: '#2259B8',
  tapering: '#1E7F9E',
  resting: '#57205F',
  checkDue: '#F2AE2A',
  ready: '#135A36',
  held: '#716A5C',
  stopped: '#7E2A20',
  alarm: '#B92C12',
  queued: '#4A4438',
  planned: '#625A4B',
  onStage: '#FFFFFF',
  onCheckDue: '#1C1A15',
  onAlarm: '#FFFFFF',
  chargingTint: '#D3DCEA',
  taperingTint: '#CFE2E6',
  restingTint: '#E2D6E2',
  checkDueTint: '#F8E4B4',
  readyTint: '#D2E2D3',
  alarmTint: '#F8DED2',
  heldTint: '#DFD8C9',
  focus: '#1B4FA8',
} as const;

export type ColorRole = keyof typeof paper;
export type Palette = Readonly<Record<ColorRole, string>>;
export type ThemeName = 'paper' | 'night';

const night: Palette = {
  ground: '#0C1113',
  sheet: '#151C1F',
  well: '#232D31',
  line: '#303C41',
  edge: '#7B8B91',
  ink: '#F6F1E6',
  ink2: '#CBC9C0',
  ink3: '#9BA4A5',
  onInk: '#0C1113',
  charging: '#4782E4',
  tapering: '#9BEBF5',
  resting: '#DB8EDC',
  checkDue: '#FFC44D',
  ready: '#3DBE7B',
  held: '#B3B1A8',
  stopped: '#F28B78',
  alarm: '#FF7350',
  queued: '#CBC9C0',
  planned: '#9BA4A5',
  onStage: '#0C1113',
  onCheckDue: '#0C1113',
  onAlarm: '#0C1113',
  chargingTint: '#1D2F4C',
  taperingTint: '#173A42',
  restingTint: '#3A2946',
  checkDueTint: '#45370F',
  readyTint: '#173B29',
  alarmTint: '#4A1F14',
  heldTint: '#2B3134',
  focus: '#FFC44D',
};

export const palettes: Readonly<Record<ThemeName, Palette>> = { paper, night };

/** Every text or mark and ground that may meet, with the WCAG 2.2 ratio it must keep. A pair not listed is not allowed. */
export const contrastPairs: readonly (readonly [ColorRole, ColorRole, 3 | 4.5])[] = [
  ...(['ink', 'ink2', 'ink3'] as const).flatMap((front) =>
    (['ground', 'sheet', 'well'] as const).map((ground) => [front, ground, 4.5] as const),
  ),
  ['onInk', 'ink', 4.5],
  ...(['charging', 'tapering', 'resting', 'ready', 'held', 'stopped'] as const).map(
    (stage) => ['onStage', stage, 4.5] as const,
  ),
  ['onCheckDue', 'checkDue', 4.5],
  ['onAlarm', 'alarm', 4.5],
  ['charging', 'ground', 4.5],
  ['charging', 'sheet', 4.5],
  ['tapering', 'ground', 3],
  ['tapering', 'sheet', 3],
  ['resting', 'ground', 4.5],
  ['resting', 'sheet', 4.5],
  ['ready', 'ground', 4.5],
  ['ready', 'sheet', 4.5],
  ['held', 'ground', 4.5],
  ['stopped', 'ground', 4.5],
  ['stopped', 'sheet', 4.5],
  ['alarm', 'ground', 4.5],
  ['alarm', 'sheet', 4.5],
  ...(
    ['chargingTint', 'taperingTint', 'restingTint', 'checkDueTint', 'readyTint', 'alarmTint', 'heldTint'] as const
  ).map((tint) => ['ink', tint, 4.5] as const),
  ['ink2', 'alarmTint', 4.5],
  ['ink2', 'checkDueTint', 4.5],
  ['ink3', 'alarmTint', 4.5],
  ['alarm', 'alarmTint', 4.5],
  ['edge', 'ground', 3],
  ['edge', 'sheet', 3],
  ['edge', 'alarmTint', 3],
  ['edge', 'checkDueTint', 3],
  ...(['charging', 'tapering', 'resting', 'ready', 'alarm'] as const).map((mark) => [mark, 'well', 3] as const),
  ['focus', 'ground', 3],
  ['focus', 'sheet', 3],
  ['ground', 'ink2', 4.5],
  ['charging', 'checkDueTint', 3],
  ['tapering', 'alarmTint', 3],
  ['tapering', 'checkDueTint', 3],
  ['resting', 'checkDueTint', 3],
  ['alarm', 'checkDueTint', 3],
];

/** The two faces: numbers and titles, and words. */
export const faces = { num: 'Barlow Condensed', text: 'Atkinson Hyperlegible Next' } as const;
export const faceStacks = {
  num: `"${faces.num}", "Arial Narrow", sans-serif`,
  text: `"${faces.text}", system-ui, sans-serif`,
} as const;

/** Type scale, px. `live` is the hero of the live screen. */
export const typeScale = {
  live: { face: 'num', weight: '600', size: 104, line: 82 },
  hero: { face: 'num', weight: '600', size: 76, line: 72 },
  numL: { face: 'num', weight: '600', size: 46, line: 46 },
  numM: { face: 'num', weight: '600', size: 32, line: 34 },
  numS: { face: 'num', weight: '600', size: 22, line: 26 },
  numXS: { face: 'num', weight: '600', size: 20, line: 24 },
  title: { face: 'num', weight: '600', size: 28, line: 32 },
  titleWide: { face: 'num', weight: '600', size: 34, line: 38 },
  heading: { face: 'text', weight: '600', size: 18, line: 24 },
  button: { face: 'text', weight: '600', size: 17, line: 23 },
  body: { face: 'text', weight: '400', size: 16, line: 23 },
  label: { face: 'text', weight: '600', size: 14, line: 19 },
  small: { face: 'text', weight: '400', size: 13, line: 18 },
} as const;
export type TypeRole = keyof typeof typeScale;

/** Sizes of the wall, px of a 1920 px wide picture. */
export const wallScale = {
  upTo6: { time: 118, repair: 80, stage: 52, glyph: 66, meta: 40, axis: 32, rowHeight: 150 },
  seven: { time: 104, repair: 80, stage: 46, glyph: 56, meta: 40, axis: 32, rowHeight: 133 },
  upTo14: { time: 92, repair: 68, stage: 38, glyph: 56, meta: 32, axis: 32, rowHeight: 139 },
  header: { clock: 84, name: 46, count: 40, live: 30, stale: 64 },
} as const;

export const space = { 1: 4, 2: 8, 3: 12, 4: 16, 5: 24, 6: 32, 7: 48 } as const;
export const margin = { phone: 16, wide: 24 } as const;
export const radius = { none: 0, mark: 2, dock: 4, control: 6, sheet: 10 } as const;
export const stroke = { hair: 1, control: 1.5, vessel: 2, chosen: 2.5, notch: 3, focus: 3 } as const;
export const touch = { min: 48, primary: 56, gloved: 64, gap: 8 } as const;
/** Durations in ms; all of them 0 under reduced motion. */
export const motion = { press: 80, state: 160, sheet: 240, fill: 600, ease: 'cubic-bezier(.2,0,0,1)' } as const;
/** First width, px, at which a layout holds. */
export const breakpoints = { phone: 0, tablet: 720, wide: 1080 } as const;
/** Widths of the layout, px. */
export const widths = {
  single: 680,
  facts: 270,
  workMin: 560,
  workMax: 790,
  workGrown: 960,
  sideMin: 292,
  sideMax: 340,
  gap: 40,
  // Facts, the grown work column, side, two gaps and the margins; beyond it the page is centred.
  page: 1698,
  rail: 92,
  railTablet: 72,
} as const;
