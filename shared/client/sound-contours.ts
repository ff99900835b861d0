/** What each stage sounds like: told apart by contour, not by pitch. 200–900 Hz, under 700 ms. */
export interface Tone {
  hertz: number;
  ms: number;
  /** Silence after it, ms. */
  gapMs?: number;
}

export type SoundName = 'resting' | 'check-due' | 'ready' | 'overdue' | 'look-in';

export const contours: Readonly<Record<SoundName, readonly Tone[]>> = {
  resting: [{ hertz: 220, ms: 380 }],
  'check-due': [
    { hertz: 392, ms: 200, gapMs: 60 },
    { hertz: 587, ms: 260 },
  ],
  ready: [
    { hertz: 392, ms: 150, gapMs: 45 },
    { hertz: 523, ms: 150, gapMs: 45 },
    { hertz: 698, ms: 240 },
  ],
  overdue: [
    { hertz: 698, ms: 260, gapMs: 60 },
    { hertz: 440, ms: 320 },
  ],
  'look-in': [{ hertz: 880, ms: 45 }],
};

/** The same pattern for `navigator.vibrate`: on, off, on … ms. */
export const vibrationOf = (tones: readonly Tone[]): number[] =>
  tones.flatMap((tone, i) => (i < tones.length - 1 ? [tone.ms, tone.gapMs ?? 0] : [tone.ms]));
