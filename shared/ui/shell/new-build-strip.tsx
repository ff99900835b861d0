import { View } from 'react-native';
import { Link } from '../primitives/link';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { touch } from '../theme/tokens';
import { web } from '../theme/web-props';

/** Offers a new version of the app; nothing happens until somebody says so. */
export function NewBuildStrip({ onTake, onLater }: { onTake: () => void; onLater: () => void }) {
  const styles = useStyles();
  return (
    <View style={styles.strip} {...web({ role: 'status' })}>
      <Txt style={styles.words}>A new version is there. What you typed is kept.</Txt>
      <View style={styles.links}>
        <Link title="Load it" onPress={onTake} />
        <Link title="Later" onPress={onLater} />
      </View>
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  strip: {
    flexDirection: 'row',
    flexWrap: 'wrap',
    alignItems: 'center',
    justifyContent: 'space-between',
    columnGap: 16,
    paddingHorizontal: 16,
    backgroundColor: colors.well,
  },
  words: { flexShrink: 1, fontSize: 14, lineHeight: 19, paddingVertical: 9 },
  links: { flexDirection: 'row', columnGap: touch.gap * 2 },
}));
