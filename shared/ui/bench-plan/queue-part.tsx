import { Pressable, View } from 'react-native';
import type { QueueRowDto } from '@/shared/contract/bench-plan';
import { useFormats } from '../format/formats';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { innerFrame } from '../theme/frame';
import { stroke, touch } from '../theme/tokens';
import { web } from '../theme/web-props';
import { latenessWords, placeWords, readyWords } from './charge-words';
import { SideSection } from './side-section';

/** The charges that wait for their channel, soonest first; a tap picks one to be moved. */
export function QueuePart({
  queue,
  now,
  picked,
  first,
  noBetter = false,
  onPick,
}: {
  queue: readonly QueueRowDto[];
  now: number;
  picked: string | null;
  first?: boolean;
  /** It was looked for a better plan, and there is none. */
  noBetter?: boolean;
  onPick: (chargeId: string) => void;
}) {
  const styles = useStyles();
  return (
    <SideSection title="Queue" aside={`${queue.length} waiting`} first={first}>
      {queue.length === 0 ? (
        <Txt kind="small" tone="ink2" style={styles.none}>
          Every charge has begun.
        </Txt>
      ) : (
        <View role="list" aria-label="Queue" style={styles.list}>
          {queue.map((row) => (
            <QueueRow
              key={row.chargeId}
              row={row}
              now={now}
              picked={picked === row.chargeId}
              onPick={() => onPick(row.chargeId)}
            />
          ))}
        </View>
      )}
      {noBetter && queue.some((row) => row.lateByMinutes > 0) ? (
        <Txt kind="small" tone="ink2">
          No other plan of these charges is less late.
        </Txt>
      ) : null}
    </SideSection>
  );
}

function QueueRow({
  row,
  now,
  picked,
  onPick,
}: {
  row: QueueRowDto;
  now: number;
  picked: boolean;
  onPick: () => void;
}) {
  const styles = useStyles();
  const formats = useFormats();
  const place = row.channelNames.length === 0 ? 'no channel yet' : placeWords(row, now, formats);
  const ready = readyWords(row, now, formats);
  const late = row.lateByMinutes > 0 ? latenessWords(row.lateByMinutes) : null;
  return (
    <View role="listitem" style={styles.item}>
      <Pressable
        role="button"
        aria-pressed={picked}
        aria-label={[`Move ${row.title}: ${place}`, ready, late, row.otherwise].filter(Boolean).join('. ')}
        onPress={onPick}
        {...web({ dataSet: { press: '' } })}
        style={({ pressed }) => [styles.row, pressed && styles.pressed, picked && styles.picked]}
      >
        <View style={styles.head}>
          <Txt kind="numS">{row.title}</Txt>
          <Txt kind="label" nowrap>
            {place}
          </Txt>
        </View>
        <Txt kind="small" tone="ink2">
          {ready}
        </Txt>
        {late ? (
          <Txt kind="small" bold tone="alarm">
            {late}
          </Txt>
        ) : null}
        {row.otherwise ? <Txt kind="small">{row.otherwise}</Txt> : null}
      </Pressable>
    </View>
  );
}

const useStyles = makeStyles((theme) => ({
  none: { marginTop: 6 },
  list: { marginTop: 6 },
  item: { borderTopWidth: 1, borderTopColor: theme.colors.line },
  row: {
    paddingVertical: 10,
    minHeight: touch.min,
    rowGap: 1,
    marginHorizontal: -8,
    paddingHorizontal: 8,
  },
  pressed: { backgroundColor: theme.colors.well },
  picked: { backgroundColor: theme.colors.sheet, ...innerFrame(theme, stroke.chosen, theme.colors.ink) },
  head: { flexDirection: 'row', justifyContent: 'space-between', alignItems: 'baseline', columnGap: 8 },
}));
