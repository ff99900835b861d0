import { View } from 'react-native';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { OnSurface } from '../theme/surface';
import { radius } from '../theme/tokens';
import { WaitRibbon } from '../wait-ribbon/wait-ribbon';
import { silhouette, rowHeight } from './lane-charge';
import { ghostSegments, type Ghost } from './move-candidate';
import { toX, type PlanAxis } from './plan-axis';

/** The silhouette where it would stand, in a dashed frame. Readers hear it from the words beside. */
export function MoveGhost({ ghost, axis }: { ghost: Ghost; axis: PlanAxis }) {
  const styles = useStyles();
  const { candidate, placed } = ghost;
  const s = (instant: string) => (Date.parse(instant) - axis.from) / 1000;
  const left = toX(axis, candidate.clipOn);
  const right = toX(axis, Date.parse(placed.ready.late));
  if (right < 0 || left > axis.width) return null;
  return (
    <View style={styles.whole} aria-hidden>
      <View style={[styles.frame, { left, width: Math.max(48, right - left) + 6 }]}>
        <Txt kind="small" bold nowrap style={styles.title}>
          {ghost.title}
        </Txt>
      </View>
      <View style={styles.ribbon}>
        <OnSurface tone="sheet">
          <WaitRibbon
            segments={ghostSegments(ghost.segments, candidate, placed, axis.from)}
            fromS={0}
            toS={(axis.to - axis.from) / 1000}
            width={axis.width}
            height={silhouette.height}
            padTop={silhouette.padTop}
            band={{ p10: s(placed.ready.early), p50: s(placed.ready.likely), p90: s(placed.ready.late) }}
            hanging={ghost.hanging}
            nowMark={false}
            line={false}
            twin=""
          />
        </OnSurface>
      </View>
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  whole: { position: 'absolute', top: 0, left: 0, right: 0, bottom: 0, pointerEvents: 'none' },
  frame: {
    position: 'absolute',
    top: 2,
    height: rowHeight - 4,
    borderWidth: 2,
    borderStyle: 'dashed',
    borderColor: colors.ink,
    borderRadius: radius.dock,
    backgroundColor: colors.sheet,
  },
  title: { marginLeft: 4, marginTop: 2 },
  ribbon: { position: 'absolute', left: 0, top: silhouette.top },
}));
