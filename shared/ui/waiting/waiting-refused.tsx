import { View } from 'react-native';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { CallOut } from '../primitives/call-out';
import { Link } from '../primitives/link';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { touch } from '../theme/tokens';
import { editPath, waitingWords, type WaitingActs, type WaitingItem } from './waiting-items';

/** One that the server did not take, or that a person must say more of: why, what is there now, and what can be done. */
export function WaitingRefused({ item, now, ...acts }: { item: WaitingItem; now: number } & WaitingActs) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const { refused } = item;
  if (refused === null) return null;
  const at = (instant: string) => moment(Date.parse(instant), zone, now, marks);
  const own = at(item.input.at);
  const what = `${waitingWords(item, marks)}, ${own}`;
  const asked = refused.code === 'clock' || refused.code === 'too-old';
  const { otherAt } = refused;
  return (
    <CallOut tone={asked ? 'amber' : 'red'} label={`Not sent: ${what}`} style={styles.box}>
      <Txt bold>{asked ? `${what}: not sent.` : `${what}: not taken.`}</Txt>
      <Txt>{refused.text}</Txt>
      <View style={styles.links}>
        {refused.code === 'clock' && otherAt ? (
          <>
            <Link title={`It was ${own}`} onPress={() => acts.onSettle(item.key)} />
            <Link title={`It was ${at(otherAt)}`} onPress={() => acts.onSettle(item.key, otherAt)} />
          </>
        ) : null}
        {refused.code === 'too-old' ? (
          <Link title="Send it" label={`Send it: ${what}`} onPress={() => acts.onSettle(item.key)} />
        ) : null}
        {!asked && editPath(item) !== null ? (
          <Link title="Edit" label={`Edit: ${what}`} onPress={() => acts.onEdit(item)} />
        ) : null}
        <Link title="Remove" label={`Remove: ${what}`} onPress={() => acts.onRemove(item.key)} />
      </View>
    </CallOut>
  );
}

const useStyles = makeStyles(() => ({
  box: { marginTop: 10, rowGap: 4 },
  links: { flexDirection: 'row', flexWrap: 'wrap', columnGap: touch.gap * 3 },
}));
