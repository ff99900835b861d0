import type { ColorRole } from '../theme/tokens';

/** Stages of a charge as the screens name them, and the condition over a stage. */
export type StageId =
  | 'planned'
  | 'queued'
  | 'charging'
  | 'discharging'
  | 'tapering'
  | 'resting'
  | 'check-due'
  | 'ready'
  | 'held'
  | 'stopped';
/** What a tag or glyph can show: a stage, or that it is overdue. */
export type StageMark = StageId | 'overdue';

export interface StageLook {
  word: string;
  /** The hue of block, fill and tag. */
  color: ColorRole;
  /** Glyph colour on that hue. */
  onColor: ColorRole;
  /** The tag has no block behind its glyph. */
  bare: boolean;
}

export const stages: Readonly<Record<StageMark, StageLook>> = {
  planned: { word: 'Planned', color: 'planned', onColor: 'ink2', bare: true },
  queued: { word: 'Queued', color: 'queued', onColor: 'ink2', bare: true },
  charging: { word: 'Charging', color: 'charging', onColor: 'onStage', bare: false },
  discharging: { word: 'Discharging', color: 'charging', onColor: 'onStage', bare: false },
  tapering: { word: 'Tapering', color: 'tapering', onColor: 'onStage', bare: false },
  resting: { word: 'Resting', color: 'resting', onColor: 'onStage', bare: false },
  'check-due': { word: 'Check due', color: 'checkDue', onColor: 'onCheckDue', bare: false },
  ready: { word: 'Ready', color: 'ready', onColor: 'onStage', bare: false },
  held: { word: 'Held', color: 'held', onColor: 'onStage', bare: false },
  stopped: { word: 'Stopped', color: 'stopped', onColor: 'onStage', bare: false },
  overdue: { word: 'Overdue', color: 'alarm', onColor: 'onAlarm', bare: false },
};

export type GlyphShape = { d: string; stroke?: number; dash?: readonly [number, number] };

/** One closed dark silhouette each on a grid of 24; the outlined two are stages where nothing flows yet. */
export const stageGlyphs: Readonly<Record<StageMark, GlyphShape>> = {
  planned: { d: 'M5 5h14v14H5z', stroke: 2.6, dash: [3.5, 3] },
  queued: { d: 'M4.5 12a7.5 7.5 0 1 0 15 0a7.5 7.5 0 1 0 -15 0z', stroke: 2.8 },
  charging: { d: 'M12 3.5 21 20H3z' },
  discharging: { d: 'M12 20.5 3 4h18z' },
  tapering: { d: 'M3 4c1.2 9.5 7 13.6 18 14.2V21H3z' },
  resting: { d: 'M3 18.5h18V21H3zM5 16a7 7 0 0 1 14 0z' },
  'check-due': { d: 'M12 1.5 22.5 12 12 22.5 1.5 12zM12 8a4 4 0 1 0 0 8 4 4 0 0 0 0-8z' },
  ready: { d: 'M12 2a10 10 0 1 0 0 20 10 10 0 0 0 0-20zm-1.6 15L5.6 12.2l2-2 2.8 2.8 6-6 2 2z' },
  held: { d: 'M5.5 4h4.6v16H5.5zM13.9 4h4.6v16h-4.6z' },
  stopped: { d: 'M4.5 4.5h15v15h-15z' },
  overdue: { d: 'M7.6 1.5h8.8l6.1 6.1v8.8l-6.1 6.1H7.6l-6.1-6.1V7.6zM10.4 5.5v8h3.2v-8zm0 10v3.1h3.2v-3.1z' },
};
