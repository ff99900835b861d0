import { View } from 'react-native';
import type { ChargeCardDto } from '@/shared/contract/charge';
import { isToCome, leftS, readyOf, type CardClock } from '../charge/card-model';
import { duration } from '../format/duration';
import { readyAt, readyBounds } from '../format/clock';
import { useFormats } from '../format/formats';
import { NBSP } from '../format/marks';
import { Duration, type NumKind } from '../primitives/num';
import { Txt } from '../primitives/txt';
import { freshTone } from '../states/stale';
import { makeStyles } from '../theme/make-styles';

/** The time of a row: what is left, and when it will be ready with its band. */
export function BenchTime({
  card,
  at,
  old = false,
  kind,
  stacked = false,
}: {
  card: ChargeCardDto;
  at: CardClock;
  old?: boolean;
  kind: NumKind;
  /** The band under the finish, beside a large number; else all in one line. */
  stacked?: boolean;
}) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const tone = freshTone(old);
  const quiet = old ? 'ink3' : 'ink2';
  if (card.stage === 'ready') return <Txt kind="numM">To be fitted</Txt>;
  if (card.stage === 'check-due' && card.checkDueAt) {
    const waits = (at.now - Date.parse(card.checkDueAt)) / 1000;
    const rested = card.currentEndAt
      ? `rested ${duration((at.now - Date.parse(card.currentEndAt)) / 1000, 'minute')}`
      : '';
    return (
      <View style={styles.row}>
        <Duration seconds={Math.max(0, waits)} precision="minute" kind={kind} tone={tone} />
        {stacked ? (
          <View>
            <Txt bold tone={tone} nowrap style={styles.tight}>
              the check waits
            </Txt>
            <Txt tone={quiet} nowrap style={styles.tight}>
              {rested}
            </Txt>
          </View>
        ) : (
          <Txt tone={quiet} style={styles.line}>
            {['the check waits', rested].filter(Boolean).join(', ')}
          </Txt>
        )}
      </View>
    );
  }
  const ready = readyOf(card, at);
  const left = leftS(card, at);
  if (!ready || left === null) return <Txt tone="ink2">Not reckoned yet</Txt>;
  const when = `ready${NBSP}${readyAt(ready, zone, at.now, marks)}`;
  const bounds = `(${readyBounds(ready, zone, at.now, marks)})`;
  return (
    <View style={styles.row}>
      <Duration seconds={left} precision={isToCome(card) ? 'plan' : 'minute'} kind={kind} tone={tone} />
      {stacked ? (
        <View>
          <Txt bold tone={tone} nowrap style={styles.tight}>
            {when}
          </Txt>
          <Txt tone={quiet} nowrap style={styles.tight}>
            {bounds}
          </Txt>
        </View>
      ) : (
        <Txt tone={quiet} nowrap style={styles.line}>{`${when} ${bounds}`}</Txt>
      )}
    </View>
  );
}

const useStyles = makeStyles(() => ({
  row: { flexDirection: 'row', alignItems: 'flex-end', columnGap: 12, flexWrap: 'wrap', flexShrink: 1 },
  tight: { lineHeight: 20 },
  line: { fontSize: 15, paddingBottom: 3 },
}));
