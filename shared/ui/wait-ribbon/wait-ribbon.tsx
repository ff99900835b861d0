import { useId, useMemo, type ReactNode } from 'react';
import { StyleSheet } from 'react-native';
import { Circle, ClipPath, Defs, G, Path, Rect, Svg } from 'react-native-svg';
import { useHalo } from '../theme/surface';
import { useTheme } from '../theme/theme';
import { layoutRibbon, type RibbonDrawing, type RibbonInput } from './layout';

export interface WaitRibbonProps extends RibbonInput {
  /** The ribbon in words (`ribbonTwin`). An empty string hides it: its words stand beside it. */
  twin: string;
  /** false where one now line runs through several rows. */
  nowMark?: boolean;
  /** The link is down: the now mark is hollow. */
  stale?: boolean;
  /** The hairline it stands on. */
  line?: boolean;
}

/** The wait as a silhouette of the current: done solid, to come in tint, the comb where it will be ready. */
export function WaitRibbon({ twin, nowMark = true, stale = false, line = true, ...input }: WaitRibbonProps) {
  const { colors } = useTheme();
  // Ids of clip paths must be plain: React's own carry characters that url(#…) does not take.
  const id = `rib${useId().replace(/[^a-zA-Z0-9]/g, '')}`;
  const key = JSON.stringify(input);
  // The input comes as fresh arrays each time a clock ticks; its content decides.
  const drawing = useMemo(() => layoutRibbon(JSON.parse(key) as RibbonInput), [key]);
  const { width, height } = drawing;
  return (
    <Svg
      width={width}
      height={height}
      viewBox={`0 0 ${width} ${height}`}
      fill="none"
      style={styles.open}
      {...(twin === '' ? { 'aria-hidden': true } : { role: 'img', 'aria-label': twin })}
    >
      {line ? <Path d={`M0 ${drawing.lineY}H${width}`} stroke={colors.line} strokeWidth={1} /> : null}
      <Cut id={`${id}a`} width={width} height={height} on={drawing.overrun !== null}>
        <ToCome drawing={drawing} />
        {drawing.hatch ? <Hatch id={`${id}h`} hatch={drawing.hatch} /> : null}
      </Cut>
      {drawing.doneWidth === null ? null : (
        <Cut id={`${id}d`} width={drawing.doneWidth} height={height} on>
          {drawing.shapes.map((shape, index) => (
            <Path key={index} d={shape.d} fill={colors[shape.color]} />
          ))}
        </Cut>
      )}
      <Marks drawing={drawing} nowMark={nowMark} stale={stale} />
    </Svg>
  );
}

/** Cuts its children to the left `width` px. */
function Cut({
  id,
  width,
  height,
  on,
  children,
}: {
  id: string;
  width: number;
  height: number;
  on: boolean;
  children: ReactNode;
}) {
  if (!on) return <>{children}</>;
  return (
    <>
      <Defs>
        <ClipPath id={id}>
          <Rect x={0} y={-20} width={width} height={height + 40} />
        </ClipPath>
      </Defs>
      <G clipPath={`url(#${id})`}>{children}</G>
    </>
  );
}

function ToCome({ drawing }: { drawing: RibbonDrawing }) {
  const { colors } = useTheme();
  return (
    <>
      {drawing.queues.map((d) => (
        <Path key={d} d={d} stroke={colors.ink3} strokeWidth={2} strokeDasharray={[2, 5]} />
      ))}
      {drawing.shapes.map((shape, index) => (
        <Path
          key={index}
          d={shape.d}
          fill={colors[shape.tint]}
          stroke={colors[shape.color]}
          strokeWidth={1.5}
          strokeLinejoin="round"
        />
      ))}
    </>
  );
}

function Hatch({ id, hatch }: { id: string; hatch: { d: string; clip: string } }) {
  const { colors } = useTheme();
  return (
    <>
      <Defs>
        <ClipPath id={id}>
          <Path d={hatch.clip} />
        </ClipPath>
      </Defs>
      <G clipPath={`url(#${id})`}>
        <Path d={hatch.d} stroke={colors.held} strokeWidth={2} />
      </G>
    </>
  );
}

function Marks({ drawing, nowMark, stale }: { drawing: RibbonDrawing; nowMark: boolean; stale: boolean }) {
  const { colors } = useTheme();
  const halo = useHalo();
  const { overrun, likely, now, stop } = drawing;
  return (
    <>
      {overrun ? (
        <>
          <Path d={overrun.halo} stroke={halo} strokeWidth={12} />
          <Path d={overrun.strokes} stroke={colors.ink} strokeWidth={2} />
        </>
      ) : null}
      {drawing.slats.map((d) => (
        <Path key={d} d={d} stroke={colors.ink} strokeWidth={drawing.slatWidth} />
      ))}
      {likely ? (
        <>
          <Path d={likely.slat} stroke={colors.ink} strokeWidth={3.5} />
          <Path d={likely.cap} fill={colors.ink} />
        </>
      ) : null}
      {drawing.pegs.map((peg) => (
        <G key={peg.stem}>
          <Path d={peg.stem} stroke={colors.ink} strokeWidth={1.5} strokeDasharray={peg.filled ? undefined : [2, 2]} />
          <Circle
            cx={peg.x}
            cy={peg.y}
            r={peg.r}
            fill={peg.filled ? colors.ink : halo}
            stroke={peg.filled ? undefined : colors.ink}
            strokeWidth={peg.filled ? 0 : 2}
          />
        </G>
      ))}
      {stop ? <Path d={stop} stroke={colors.ink} strokeWidth={3} /> : null}
      {now && nowMark && stale ? (
        <>
          <Path d={now.hollow.post} stroke={colors.ink} strokeWidth={1.5} />
          <Path d={now.hollow.foot} fill={halo} stroke={colors.ink} strokeWidth={1.5} />
        </>
      ) : null}
      {now && nowMark && !stale ? (
        <>
          <Path d={now.stem} stroke={halo} strokeWidth={6} />
          <Path d={now.stem} stroke={colors.ink} strokeWidth={2.5} />
          <Path d={now.foot} fill={colors.ink} />
        </>
      ) : null}
    </>
  );
}

const styles = StyleSheet.create({ open: { overflow: 'visible' } });
