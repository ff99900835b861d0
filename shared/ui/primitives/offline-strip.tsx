import { View } from 'react-native';
import { Icon } from '../icons/icon';
import { makeStyles } from '../theme/make-styles';
import { web } from '../theme/web-props';
import { Link } from './link';
import { Span, Txt } from './txt';

/** Under the header while there is no connection: since when, and how many readings wait on this device. */
export function OfflineStrip({
  since,
  waiting,
  device = 'phone',
  onSee,
}: {
  since: string;
  waiting: number;
  device?: 'phone' | 'device';
  /** Opens the list of what waits. */
  onSee?: () => void;
}) {
  const styles = useStyles();
  return (
    <View style={styles.strip} {...web({ role: 'status' })}>
      <Icon name="unheard" size={24} tone="onInk" />
      <Txt tone="onInk" style={styles.words}>
        {`No connection since ${since}. Readings you log are kept on this ${device}${waiting > 0 ? ': ' : '.'}`}
        {waiting > 0 ? <Span bold>{`${waiting} waiting`}</Span> : null}
        {waiting > 0 ? '.' : ''}
      </Txt>
      {onSee ? <Link title="See" label="See what waits here" tone="onInk" tight align="right" onPress={onSee} /> : null}
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  strip: {
    flexDirection: 'row',
    alignItems: 'center',
    columnGap: 10,
    paddingVertical: 9,
    paddingHorizontal: 16,
    backgroundColor: colors.ink,
  },
  words: { flex: 1, fontSize: 14, lineHeight: 19 },
}));
