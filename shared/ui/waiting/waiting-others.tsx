import { View } from 'react-native';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { Link } from '../primitives/link';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { waitingWords, type WaitingItem } from './waiting-items';

/** Look-ins, checks and answers that wait here, latest first: when, what, and the way to take it back. */
export function WaitingOthers({
  items,
  now,
  device,
  onRemove,
}: {
  items: readonly WaitingItem[];
  now: number;
  device: string;
  onRemove: (key: string) => void;
}) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  if (items.length === 0) return null;
  const at = (item: WaitingItem) => moment(Date.parse(item.input.at), zone, now, marks);
  return (
    <View role="list" aria-label={`Look-ins, checks and answers waiting on this ${device}`}>
      {[...items].reverse().map((item) => (
        <View key={item.key} role="listitem" style={styles.row}>
          <Txt kind="numS" nowrap style={styles.at}>
            {at(item)}
          </Txt>
          <Txt style={styles.words}>{waitingWords(item, marks)}</Txt>
          <Link
            title="remove"
            kind="small"
            align="right"
            label={`Remove what was done ${at(item)}: ${waitingWords(item, marks)}`}
            onPress={() => onRemove(item.key)}
          />
        </View>
      ))}
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  row: {
    flexDirection: 'row',
    alignItems: 'center',
    columnGap: 12,
    minHeight: 48,
    borderTopWidth: 1,
    borderTopColor: colors.line,
  },
  at: { minWidth: 62 },
  words: { flex: 1, minWidth: 0 },
}));
