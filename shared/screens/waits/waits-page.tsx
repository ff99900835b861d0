import { useRouter, type Href } from 'expo-router';
import { View } from 'react-native';
import { sentenceOf } from '@/shared/client/api-problem';
import { useWaits } from '@/shared/client/waits';
import type { WaitsDto } from '@/shared/contract/waits';
import { Rule } from '@/shared/ui/primitives/rule';
import { Txt } from '@/shared/ui/primitives/txt';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { Empty } from '@/shared/ui/states/empty';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Loading } from '@/shared/ui/states/loading';
import { makeStyles } from '@/shared/ui/theme/make-styles';
import { widths } from '@/shared/ui/theme/tokens';
import { useBreakpoint } from '@/shared/ui/theme/use-breakpoint';
import { ChannelBusy } from '@/shared/ui/waits/channel-busy';
import { StageRibbon } from '@/shared/ui/waits/stage-ribbon';
import { WaitFigures } from '@/shared/ui/waits/wait-figures';
import { stageNames } from '@/shared/contract/wait-names';
import { chargesWord } from '@/shared/ui/waits/wait-words';
import { WeekChart } from '@/shared/ui/waits/week-chart';
import { ChargesPart } from './charges-part';
import { ChannelsPart } from './channels-part';
import { ComparePart } from './compare-part';
import { CsvButton } from './csv-button';
import { FiltersPart } from './filters-part';
import { GroupsPart } from './groups-part';
import { ShelfPart } from './shelf-part';
import { ShortenPart } from './shorten-part';
import { useCsv, type Csv } from './use-csv';
import { useWaitAddress, type WaitAddressHeld } from './use-wait-address';

/** Where the hours of waiting go, for those who decide about chargers and shelves. */
export function WaitsPage() {
  const styles = useStyles();
  const router = useRouter();
  const address = useWaitAddress();
  const waits = useWaits(address.query);
  const csv = useCsv(address.query);
  const data = waits.data;
  const save = csv.of('charges');
  return (
    <Screen
      header={
        <HeaderBar
          title="Waits"
          sub={data ? (waits.isPlaceholderData ? 'Reading the new figures' : chargesWord(data.charges)) : undefined}
          {...(save && data && data.charges > 0 ? { tools: <CsvButton busy={csv.busy} onPress={save} /> } : {})}
        />
      }
    >
      <View style={styles.page} aria-busy={waits.isPlaceholderData || undefined}>
        <FiltersPart address={address} />
        {csv.problem ? (
          <Txt tone={csv.down ? 'ink2' : 'alarm'} kind="small" role="alert">
            {csv.problem}
          </Txt>
        ) : null}
        {data ? (
          data.charges === 0 ? (
            <Empty
              sentence={
                address.narrowed > 0
                  ? 'No charge was finished in this time that fits the filters.'
                  : 'No charge was finished in this time.'
              }
              action={{ title: 'To the bench', onPress: () => router.navigate('/bench' as Href) }}
            />
          ) : (
            <Body address={address} csv={csv} data={data} />
          )
        ) : waits.isError ? (
          <ErrorState
            failed="The waits could not be read."
            toDo={sentenceOf(waits.error)}
            action={{ title: 'Try again', onPress: () => void waits.refetch(), busy: waits.isFetching }}
          />
        ) : (
          <Loading what="the waits" onRetry={() => void waits.refetch()} />
        )}
      </View>
    </Screen>
  );
}

function Body({ address, csv, data }: { address: WaitAddressHeld; csv: Csv; data: WaitsDto }) {
  const styles = useStyles();
  const wide = useBreakpoint() === 'wide';
  const { query, today, go, chargesHref } = address;
  return (
    <View style={wide ? styles.columns : styles.stack}>
      <View style={[styles.stack, wide && styles.work]}>
        <WaitFigures waits={data} today={today} ways={{ hrefOf: (week = '') => chargesHref({ week }), onGo: go }} />
        {query.stage ? (
          <Txt kind="small" tone="ink2">
            {`Times are of ${stageNames[query.stage].toLowerCase()} alone; used and lost hours are of the whole wait.`}
          </Txt>
        ) : null}
        <View style={wide ? styles.beside : styles.stack}>
          <View style={wide && styles.weeks}>
            <WeekChart
              weeks={data.weeks}
              today={today}
              onWeek={(week) => go(chargesHref({ week }))}
              onCsv={csv.of('weeks')}
            />
          </View>
          <View style={wide && styles.busy}>
            <ChannelBusy
              channels={data.channels}
              onChannel={(channel) => go(chargesHref({ channel }))}
              onCsv={csv.of('channels')}
            />
          </View>
        </View>
        <Rule gap={0} />
        <StageRibbon stages={data.stages} onStage={(stage) => go(chargesHref({ stage }))} onCsv={csv.of('stages')} />
        <GroupsPart address={address} csv={csv} />
        <ChargesPart address={address} count={data.charges} />
      </View>
      <View style={[styles.stack, wide && styles.side]}>
        <ShortenPart address={address} />
        <Rule gap={0} />
        <ShelfPart address={address} />
        <Rule gap={0} />
        <ChannelsPart address={address} />
        <Rule gap={0} />
        <ComparePart address={address} />
      </View>
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  page: { rowGap: 20, paddingTop: 8 },
  stack: { rowGap: 24 },
  columns: { flexDirection: 'row', columnGap: widths.gap, alignItems: 'flex-start' },
  work: { flexGrow: 790, flexShrink: 1, flexBasis: widths.workMin, minWidth: 0, maxWidth: widths.workGrown },
  side: {
    flexGrow: 400,
    flexShrink: 1,
    flexBasis: widths.sideMin,
    minWidth: widths.sideMin,
    maxWidth: 470,
    backgroundColor: colors.sheet,
    borderRadius: 10,
    padding: 20,
  },
  beside: { flexDirection: 'row', columnGap: 32, alignItems: 'flex-start' },
  weeks: { flexGrow: 1, flexShrink: 1, flexBasis: 0, minWidth: 0 },
  busy: { width: 260 },
}));
