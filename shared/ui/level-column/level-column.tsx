import { useMemo } from 'react';
import { G, Path, Rect, Svg, Text as SvgText } from 'react-native-svg';
import { useFormats } from '../format/formats';
import { LevelFill } from '../motion/level-fill';
import type { StageId } from '../stage/stages';
import { useHalo } from '../theme/surface';
import { useTheme } from '../theme/theme';
import { faceStacks } from '../theme/tokens';
import type { ColumnGroup } from './groups';
import { layoutColumn, type VesselDrawing } from './layout';
import type { ColumnScale } from './scale';
import { columnSize, type ColumnPlace, type ColumnSize } from './size';
import { columnTwin } from './twin';

export interface LevelColumnProps {
  groups: readonly ColumnGroup[];
  targetVolts: number;
  toleranceVolts?: number;
  /** Left out: the full window 3.00–4.20 V. Give the type's own limits where they are known. */
  scale?: ColumnScale;
  place: ColumnPlace;
  /** Single measures that differ from the place's. */
  size?: Partial<ColumnSize>;
  stage: StageId;
  reckoned?: boolean;
  labels?: boolean;
  ends?: boolean;
  tab?: boolean;
  floorVolts?: number | null;
  /** Begins the text twin: 'S-0398'. */
  name?: string;
  /** The whole twin, where the place knows better. An empty string hides the drawing: its words stand beside it. */
  twin?: string;
  /** Levels move to a new reading in 600 ms. A change of scale is a cut. */
  moving?: boolean;
}

const fullWindow: ColumnScale = { kind: 'window', lowVolts: 3, highVolts: 4.2 };

/** The groups of a module as vessels, the target as a notch across them. */
export function LevelColumn({
  groups,
  targetVolts,
  toleranceVolts = 0.005,
  scale = fullWindow,
  place,
  size,
  stage,
  reckoned,
  labels,
  ends,
  tab,
  floorVolts,
  name,
  twin,
  moving = false,
}: LevelColumnProps) {
  const { colors } = useTheme();
  const halo = useHalo();
  const { marks } = useFormats();
  const drawing = useMemo(
    () =>
      layoutColumn({
        groups,
        targetVolts,
        toleranceVolts,
        scale,
        size: columnSize(place, groups.length, size),
        stage,
        reckoned,
        labels,
        ends,
        tab,
        floorVolts,
        marks,
      }),
    [groups, targetVolts, toleranceVolts, scale, place, size, stage, reckoned, labels, ends, tab, floorVolts, marks],
  );
  const words = twin ?? columnTwin({ groups, targetVolts, toleranceVolts, stage, name, reckoned, floorVolts, marks });
  const { width, height, x0, x1, notchY } = drawing;
  const stroke = columnSize(place, groups.length, size).stroke;
  return (
    <Svg
      width={width}
      height={height}
      viewBox={`0 0 ${width} ${height}`}
      fill="none"
      {...(words === '' ? { 'aria-hidden': true } : { role: 'img', 'aria-label': words })}
    >
      {drawing.vessels.map((vessel) => (
        <Vessel
          key={vessel.group.number}
          vessel={vessel}
          stroke={stroke}
          footStroke={drawing.footStroke}
          // Another scale is another drawing: the fills start anew instead of sliding.
          cut={`${scale.kind}-${height}`}
          moving={moving}
        />
      ))}
      {drawing.ends.map((end) => (
        <SvgText
          key={end.text}
          x={end.x}
          y={end.y}
          textAnchor="end"
          fill={colors.ink2}
          fontFamily={faceStacks.text}
          fontSize={13}
        >
          {end.text}
        </SvgText>
      ))}
      <Path d={`M${x0} ${notchY}H${x1}`} stroke={halo} strokeWidth={6.5} />
      <Path d={`M${x0} ${notchY}H${x1}`} stroke={colors.ink} strokeWidth={3} />
      {drawing.notchTab ? <Path d={drawing.notchTab} fill={colors.ink} /> : null}
      {drawing.toleranceYs.map((y) => (
        <Path
          key={y}
          d={`M${x0} ${y}H${drawing.toleranceX1}`}
          stroke={colors.ink}
          strokeWidth={1.2}
          strokeDasharray={[2.5, 2.5]}
        />
      ))}
      {drawing.floorY === null ? null : (
        <Path d={`M${x0} ${drawing.floorY}H${x1}`} stroke={colors.ink} strokeWidth={2} strokeDasharray={[7, 4]} />
      )}
    </Svg>
  );
}

function Vessel({
  vessel,
  stroke,
  footStroke,
  cut,
  moving,
}: {
  vessel: VesselDrawing;
  stroke: number;
  footStroke: number;
  cut: string;
  moving: boolean;
}) {
  const { colors } = useTheme();
  const halo = useHalo();
  const { glass, strip, fill, name, figure } = vessel;
  const across = (y: number) => `M${fill.x} ${y}h${fill.w}`;
  return (
    <G>
      <Rect x={glass.x} y={glass.y} width={glass.w} height={glass.h} fill={colors.well} />
      {strip ? (
        <Rect x={strip.x} y={strip.y} width={strip.w} height={strip.h} fill={colors.ground} opacity={0.85} />
      ) : null}
      <LevelFill
        key={cut}
        box={fill}
        color={colors[vessel.fillColor]}
        outline={vessel.outlined ? colors.ink : undefined}
        moving={moving}
      />
      {vessel.oddMark ? <Path d={vessel.oddMark} fill={colors.alarm} /> : null}
      {vessel.reckonedY === null ? null : (
        <Path d={across(vessel.reckonedY)} stroke={colors.well} strokeWidth={2} strokeDasharray={[3, 3]} />
      )}
      {vessel.beganY === null ? null : <Path d={across(vessel.beganY)} stroke={colors.well} strokeWidth={2} />}
      <Path d={vessel.wall} stroke={colors.edge} strokeWidth={stroke} />
      {vessel.foot ? <Path d={vessel.foot} stroke={halo} strokeWidth={footStroke} /> : null}
      {vessel.clipMark ? <Path d={vessel.clipMark} fill={colors.ink2} /> : null}
      {name ? (
        <SvgText
          x={name.x}
          y={name.y}
          textAnchor="middle"
          fill={colors.ink2}
          fontFamily={faceStacks.text}
          fontSize={13}
        >
          {name.text}
        </SvgText>
      ) : null}
      {figure ? (
        <SvgText
          x={figure.x}
          y={figure.y}
          textAnchor="middle"
          fill={vessel.group.odd ? colors.alarm : colors.ink}
          fontFamily={faceStacks.num}
          fontSize={18}
          fontWeight="600"
        >
          {figure.text}
        </SvgText>
      ) : null}
    </G>
  );
}
