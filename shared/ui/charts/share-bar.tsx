import { View } from 'react-native';
import { innerFrame } from '../theme/frame';
import { makeStyles } from '../theme/make-styles';
import { stroke } from '../theme/tokens';

/** A share 0…1 as one flat bar, 14 px high; its number stands beside it, so readers pass it over. */
export function ShareBar({ share }: { share: number }) {
  const styles = useStyles();
  return (
    <View style={styles.box} aria-hidden>
      <View style={[styles.fill, { width: `${Math.max(0, Math.min(1, share)) * 100}%` }]} />
      <View style={styles.frame} />
    </View>
  );
}

const useStyles = makeStyles((theme) => ({
  box: { height: 14, flexGrow: 1, flexShrink: 1, flexBasis: 0 },
  fill: { height: 14, backgroundColor: theme.colors.ink2 },
  frame: {
    position: 'absolute',
    top: 0,
    right: 0,
    bottom: 0,
    left: 0,
    ...innerFrame(theme, stroke.control, theme.colors.edge),
  },
}));
