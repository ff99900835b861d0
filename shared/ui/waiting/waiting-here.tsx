import { View } from 'react-native';
import type { ReadingDto } from '@/shared/contract/charge';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import type { WaitingActs, WaitingItem, WaitingReadingItem } from './waiting-items';
import { WaitingOthers } from './waiting-others';
import { WaitingReadings } from './waiting-readings';
import { WaitingRefused } from './waiting-refused';

/** What of one charge waits on this device: what was not taken first, then what is sent by itself. */
export function WaitingHere({
  items,
  last,
  now,
  device,
  title = `Waiting on this ${device}`,
  ...acts
}: {
  items: readonly WaitingItem[];
  /** The charge's last reading that was sent. */
  last: ReadingDto | null;
  now: number;
  /** 'phone' or 'device'. */
  device: string;
  title?: string;
} & WaitingActs) {
  const styles = useStyles();
  if (items.length === 0) return null;
  const unsent = items.filter(({ refused }) => refused === null);
  const isReading = (item: WaitingItem): item is WaitingReadingItem => item.kind === 'reading';
  return (
    <View>
      <View style={styles.head}>
        <Txt kind="heading" heading={2}>
          {title}
        </Txt>
        <Txt kind="small" tone="ink2">
          sent once each
        </Txt>
      </View>
      {items.map((item) => (
        <WaitingRefused key={item.key} item={item} now={now} {...acts} />
      ))}
      <WaitingReadings
        last={last}
        waiting={unsent.filter(isReading)}
        now={now}
        device={device}
        onRemove={acts.onRemove}
      />
      <WaitingOthers
        items={unsent.filter((item) => !isReading(item))}
        now={now}
        device={device}
        onRemove={acts.onRemove}
      />
    </View>
  );
}

const useStyles = makeStyles(() => ({
  head: { flexDirection: 'row', justifyContent: 'space-between', alignItems: 'baseline', columnGap: 12 },
}));
