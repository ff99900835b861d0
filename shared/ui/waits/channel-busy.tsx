import { Pressable, View } from 'react-native';
import type { ChannelBusyDto } from '@/shared/contract/waits';
import { ChartFrame } from '../charts/chart-frame';
import { ShareBar } from '../charts/share-bar';
import { fixed } from '../format/number';
import { share } from '../format/quantities';
import { Table } from '../primitives/table';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { touch } from '../theme/tokens';
import { useBreakpoint } from '../theme/use-breakpoint';
import { web } from '../theme/web-props';

const busyText = (one: ChannelBusyDto): string => (one.share === null ? '–' : share(one.share));

/** How much of the working hours each channel was held; a row opens the charges that were on it. */
export function ChannelBusy({
  channels,
  onChannel,
  onCsv,
}: {
  channels: readonly ChannelBusyDto[];
  onChannel: (id: string) => void;
  onCsv?: (() => void) | undefined;
}) {
  const styles = useStyles();
  const wide = useBreakpoint() === 'wide';
  return (
    <ChartFrame
      heading="Channel busy"
      note="Of the working hours; also charges not finished yet."
      {...(onCsv ? { onCsv } : {})}
      picture={
        <View role="list" aria-label="Channel busy">
          {channels.map((one) => (
            <View role="listitem" key={one.channelId}>
              <Pressable
                role="button"
                aria-label={`${one.name}${one.retired ? ', retired' : ''}, busy ${busyText(one)}. Open its charges`}
                onPress={() => onChannel(one.channelId)}
                {...web({ dataSet: { press: '' } })}
                style={({ pressed }) => [styles.row, wide && styles.low, pressed && styles.pressed]}
              >
                <Txt kind="numS" nowrap style={styles.name}>
                  {one.name}
                </Txt>
                <ShareBar share={one.share ?? 0} />
                <Txt kind="numS" align="right" nowrap style={styles.share}>
                  {busyText(one)}
                </Txt>
              </Pressable>
            </View>
          ))}
        </View>
      }
      table={
        <Table
          label="How busy the channels were"
          rows={channels}
          rowKey={(one) => one.channelId}
          rowLabel={(one) => `Open the charges on ${one.name}`}
          onOpen={(one) => onChannel(one.channelId)}
          columns={[
            { key: 'name', title: 'Channel', phone: 'name', cell: (one) => one.name },
            { key: 'busy', title: 'Busy, h', numeric: true, phone: 'none', cell: (one) => fixed(one.busyHours, 1) },
            { key: 'open', title: 'Of, h', numeric: true, phone: 'none', cell: (one) => fixed(one.openHours, 1) },
            { key: 'share', title: 'Busy', numeric: true, phone: 'value', cell: busyText },
          ]}
        />
      }
    />
  );
}

const useStyles = makeStyles(({ colors }) => ({
  row: { flexDirection: 'row', alignItems: 'center', columnGap: 12, minHeight: touch.min },
  // As low as the rows of a table on the desk.
  low: { minHeight: 34 },
  pressed: { backgroundColor: colors.well },
  name: { minWidth: 36 },
  share: { width: 56 },
}));
