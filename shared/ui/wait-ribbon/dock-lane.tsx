import { Pressable, View } from 'react-native';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { radius, stroke, touch } from '../theme/tokens';
import { web } from '../theme/web-props';

export interface Dock {
  key: string;
  fromS: number;
  toS: number;
  /** A fill taken in a wait, a piece of free time, or the person's own work. */
  kind: 'fill' | 'free' | 'own' | 'break';
  title: string;
  /** What readers hear: 'Hose, R-2420, 14:13 to 14:48'. */
  label?: string;
  onPress?: () => void;
}

/** px a title needs at least; narrower docks keep their shape and lose the word. */
const wordRoom = 26;

/** Pieces of work and free time under a ribbon, on its axis. Lost time is left empty, not shaded. */
export function DockLane({
  docks,
  fromS,
  toS,
  width,
  height = 28,
  label: laneLabel,
}: {
  docks: readonly Dock[];
  fromS: number;
  toS: number;
  width: number;
  height?: number;
  label: string;
}) {
  const styles = useStyles();
  const toX = (s: number) => ((s - fromS) / (toS - fromS)) * width;
  return (
    <View role="list" aria-label={laneLabel} style={{ width, height }}>
      {docks.map(({ key, kind, title, label, onPress, ...at }) => {
        const left = Math.max(0, toX(at.fromS));
        const wide = Math.max(0, Math.min(width, toX(at.toS)) - left - 1);
        const words = label ?? title;
        const dock = (
          <View
            style={[styles.dock, styles[kind], { height }, wide < 64 && styles.narrow, kind === 'free' && styles.tight]}
          >
            {wide < wordRoom ? null : (
              <Txt
                kind="small"
                tone={kind === 'free' || kind === 'own' ? 'ink2' : kind === 'break' ? 'ink3' : 'ink'}
                bold={kind === 'fill'}
                numberOfLines={1}
                aria-hidden
              >
                {title}
              </Txt>
            )}
          </View>
        );
        // The target of a dock to tap reaches over it: 48 px, however low the lane is.
        const reach = {
          left,
          width: wide,
          height: Math.max(height, touch.min),
          top: Math.min(0, (height - touch.min) / 2),
        };
        return (
          <View key={key} role="listitem" style={styles.item}>
            {onPress ? (
              <Pressable role="button" aria-label={words} onPress={onPress} style={[styles.place, reach]}>
                {dock}
              </Pressable>
            ) : (
              <View
                style={[styles.place, { left, width: wide, height, top: 0 }]}
                {...web({ role: 'img' })}
                aria-label={words}
              >
                {dock}
              </View>
            )}
          </View>
        );
      })}
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  item: { position: 'static' },
  place: { position: 'absolute', justifyContent: 'center' },
  dock: {
    borderRadius: radius.dock,
    justifyContent: 'center',
    paddingHorizontal: 8,
    overflow: 'hidden',
  },
  narrow: { paddingLeft: 4, paddingRight: 2 },
  // Its minutes are all a free stretch says: they need the room more than the air.
  tight: { paddingHorizontal: 2 },
  fill: { backgroundColor: colors.sheet, borderWidth: stroke.control, borderColor: colors.ink, borderLeftWidth: 5 },
  free: {
    borderWidth: stroke.control,
    borderColor: colors.edge,
    borderStyle: 'dashed',
    backgroundColor: colors.ground,
  },
  own: { backgroundColor: colors.well },
  // A line of now behind it would go through its word.
  break: {
    alignItems: 'center',
    paddingLeft: 0,
    paddingRight: 0,
    paddingHorizontal: 0,
    backgroundColor: colors.ground,
  },
}));
