import { View } from 'react-native';
import { Link } from '../primitives/link';
import { Txt } from '../primitives/txt';
import { StageGlyph } from '../stage/stage-glyph';
import { makeStyles } from '../theme/make-styles';
import { web } from '../theme/web-props';

/** Something that was logged without a connection was not taken: somebody has to look at it. */
export function NotTakenStrip({ count, onSee }: { count: number; onSee: () => void }) {
  const styles = useStyles();
  return (
    <View style={styles.strip} {...web({ role: 'status' })}>
      <StageGlyph stage="overdue" size={22} tone="ink" />
      <Txt style={styles.words}>
        {count === 1 ? 'One entry of this device was not taken.' : `${count} entries of this device were not taken.`}
      </Txt>
      <Link title="See why" align="right" onPress={onSee} />
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  strip: {
    flexDirection: 'row',
    alignItems: 'center',
    columnGap: 10,
    paddingHorizontal: 16,
    backgroundColor: colors.checkDueTint,
  },
  words: { flex: 1, fontSize: 14, lineHeight: 19 },
}));
