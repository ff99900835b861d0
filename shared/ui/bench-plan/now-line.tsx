import { View } from 'react-native';
import { makeStyles } from '../theme/make-styles';

/**
 * The line of now, from edge to edge of the lane it stands in: the lanes lie against each other, so it is one line through
 * all of them. It stands before the silhouettes and behind the words.
 */
export function NowLine({ x, stale }: { x: number | null; stale: boolean }) {
  const styles = useStyles();
  if (x === null) return null;
  return <View style={[styles.line, stale && styles.stale, { left: x - (stale ? 2.5 : 1.25) }]} />;
}

const useStyles = makeStyles(({ colors }) => ({
  line: {
    position: 'absolute',
    top: 0,
    bottom: 0,
    width: 2.5,
    backgroundColor: colors.ink,
    pointerEvents: 'none',
    zIndex: 1,
  },
  // The link is down: hollow, as the mark of every ribbon is.
  stale: {
    width: 5,
    backgroundColor: 'transparent',
    borderLeftWidth: 1.5,
    borderRightWidth: 1.5,
    borderColor: colors.ink3,
  },
}));
