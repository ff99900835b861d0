import { pointMarks, type LocaleMarks } from '../format/marks';
import { clipVoltsNumber } from '../format/quantities';
import type { StageId } from '../stage/stages';
import type { ColorRole } from '../theme/tokens';
import { drawnGroups, type ColumnGroup, type DrawnGroup } from './groups';
import { scaleEnds, type ColumnScale } from './scale';
import type { ColumnSize } from './size';

export interface ColumnInput {
  groups: readonly ColumnGroup[];
  targetVolts: number;
  toleranceVolts: number;
  scale: ColumnScale;
  size: ColumnSize;
  /** Decides the hue of the fills. A spare on the shelf is 'planned'. */
  stage: StageId;
  /** Levels reckoned from readings under current: a dashed cut under the top. */
  reckoned?: boolean;
  /** Names under and figures above the vessels. */
  labels?: boolean;
  /** The ends of the scale at the left. */
  ends?: boolean;
  /** The tab at the right of the notch. */
  tab?: boolean;
  /** A charge is ruled out below it, V. */
  floorVolts?: number | null;
  /** Decimal mark of the ends. */
  marks?: LocaleMarks;
}

export interface Box {
  x: number;
  y: number;
  w: number;
  h: number;
}

export interface Label {
  x: number;
  y: number;
  text: string;
}

export interface VesselDrawing {
  group: DrawnGroup;
  glass: Box;
  /** Tolerance strip, only on the near scale. */
  strip: Box | null;
  fill: Box;
  fillColor: ColorRole;
  /** Amber never stands without an ink outline. */
  outlined: boolean;
  reckonedY: number | null;
  beganY: number | null;
  /** Open at the top. */
  wall: string;
  /** Slanted cut through the foot; null on the full window. */
  foot: string | null;
  oddMark: string | null;
  clipMark: string | null;
  name: Label | null;
  figure: Label | null;
}

export interface ColumnDrawing {
  width: number;
  height: number;
  vessels: VesselDrawing[];
  /** Left and right end of every line across the vessels. */
  x0: number;
  x1: number;
  notchY: number;
  notchTab: string | null;
  toleranceYs: number[];
  /** Where the dashed tolerance lines end: before the tab. */
  toleranceX1: number;
  floorY: number | null;
  footStroke: number;
  ends: Label[];
}

/** The hue of a stage's fills. Nothing flows yet, or no stage at all: ink. */
export function fillColor(stage: StageId): ColorRole {
  if (stage === 'discharging') return 'charging';
  if (stage === 'check-due') return 'checkDue';
  return stage === 'queued' || stage === 'planned' ? 'ink3' : stage;
}

const n = (value: number) => Math.round(value * 100) / 100;
/** Room a name or a figure needs, px. */
const nameRoom = 22;
const figureRoom = 44;

/** What stands over one of three groups that stand for many. */
const rankWord = (rank: DrawnGroup['rank']) => (rank === 'lowest' ? 'low' : rank === 'highest' ? 'high' : rank);

/**
 * Every mark of a level column in px, origin at the top left.
 *
 * Fill = rest voltage, 3 px from the glass (2 in narrow vessels); notch = target, across all vessels.
 */
export function layoutColumn(input: ColumnInput): ColumnDrawing {
  const { targetVolts, scale, size, stage, tab = true, marks = pointMarks } = input;
  const { w, gap, h, stroke } = size;
  const groups = drawnGroups(input.groups);
  const near = scale.kind === 'near';
  const { low, high } = scaleEnds(scale, targetVolts);
  const labels = input.labels === true && w + gap >= nameRoom;
  const padL = input.ends ? 40 : tab ? 10 : 4;
  const padT = labels ? 22 : groups.some((group) => group.odd) ? 12 : 3;
  const padB = labels ? 22 : 3;
  const padR = tab ? 12 : 4;
  const width = padL + groups.length * w + Math.max(0, groups.length - 1) * gap + padR;
  const height = padT + h + padB;
  const y = (volts: number) => padT + h - ((Math.max(low, Math.min(high, volts)) - low) / (high - low)) * h;
  const glassGap = Math.max(stroke, w > 16 ? 3 : 2);
  const hue = fillColor(stage);

  const vessels = groups.map((group, index): VesselDrawing => {
    const x = padL + index * (w + gap);
    const top = y(group.volts);
    const inner = { x: n(x + glassGap), w: n(w - 2 * glassGap) };
    const color = group.odd && hue !== 'checkDue' ? 'alarm' : hue;
    const stripTop = y(targetVolts + input.toleranceVolts);
    const cutY = padT + h - Math.max(7, h * 0.07);
    const slant = Math.min(4, w / 6);
    const figure = labels && w + gap >= figureRoom ? (group.text ?? rankWord(group.rank)) : undefined;
    const clipY = group.clipVolts == null ? null : y(group.clipVolts);
    return {
      group,
      glass: { x: n(x), y: padT, w, h },
      strip: near ? { x: n(x), y: n(stripTop), w, h: n(y(targetVolts - input.toleranceVolts) - stripTop) } : null,
      fill: { ...inner, y: n(top), h: n(Math.max(0, padT + h - top - glassGap / 2)) },
      fillColor: color,
      outlined: color === 'checkDue',
      reckonedY: input.reckoned ? n(top + 3) : null,
      beganY: group.beganVolts == null || near ? null : n(y(group.beganVolts)),
      wall: `M${n(x)} ${padT}v${h}h${w}v${-h}`,
      foot: scale.kind === 'window' ? null : `M${n(x - 3)} ${n(cutY + slant)}L${n(x + w + 3)} ${n(cutY - slant)}`,
      // A figure in alarm takes the triangle's place.
      oddMark: group.odd && figure === undefined ? `M${n(x + w / 2 - 5)} 1h10l-5 8z` : null,
      clipMark: clipY === null ? null : `M${n(x + w + 1)} ${n(clipY)}l6 -4.5v9z`,
      name: labels ? { x: n(x + w / 2), y: height - 5, text: `G${group.number}` } : null,
      figure: figure === undefined ? null : { x: n(x + w / 2), y: 14, text: figure },
    };
  });

  const notchY = n(y(targetVolts));
  const x0 = padL - (tab ? 8 : 3);
  const x1 = width - padR + (tab ? 9 : 3);
  return {
    width: n(width),
    height,
    vessels,
    x0: n(x0),
    x1: n(x1),
    notchY,
    notchTab: tab ? `M${n(x1 - 9)} ${notchY}l10 -6.5v13z` : null,
    toleranceYs: near ? [input.toleranceVolts, -input.toleranceVolts].map((d) => n(y(targetVolts + d))) : [],
    toleranceX1: n(tab ? x1 - 9 : x1),
    floorY: input.floorVolts == null ? null : n(y(input.floorVolts)),
    footStroke: h > 100 ? 5 : 3.5,
    ends: input.ends
      ? [
          { x: padL - 6, y: padT + 10, text: clipVoltsNumber(high, marks) },
          { x: padL - 6, y: padT + h, text: clipVoltsNumber(low, marks) },
        ]
      : [],
  };
}
