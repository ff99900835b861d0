import { useRouter, type Href } from 'expo-router';
import { View } from 'react-native';
import { sentenceOf } from '@/shared/client/api-problem';
import { useWaitCharges } from '@/shared/client/waits';
import { date } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { instantOfDay } from '@/shared/ui/format/zone';
import { Button } from '@/shared/ui/primitives/button';
import { Txt } from '@/shared/ui/primitives/txt';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { Empty } from '@/shared/ui/states/empty';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Loading } from '@/shared/ui/states/loading';
import { ChargeRows } from '@/shared/ui/waits/charge-rows';
import { addressOf } from '@/shared/ui/waits/wait-address';
import { CsvButton } from './csv-button';
import { useCsv } from './use-csv';
import { narrowedWords, useFilterChoices } from './use-filter-choices';
import { useWaitAddress, type WaitAddressHeld } from './use-wait-address';

/** The charges behind a number of the waits, newest first, all of them page after page. */
export function ChargesPage() {
  const router = useRouter();
  const address = useWaitAddress();
  const { params, query, week } = address;
  const behind = { ...query, ...(week === null ? {} : { week }) };
  const asked = useWaitCharges(behind);
  const csv = useCsv(behind);
  const about = useAbout(address);
  const rows = asked.data?.pages.flatMap((page) => page.rows);
  const back = addressOf('/waits', { ...params, week: '' });
  const save = csv.of('charges');
  const toWaits = () => (router.canGoBack() ? router.back() : router.replace(back as Href));
  return (
    <Screen
      header={
        <HeaderBar
          title="Charges"
          sub="behind the waits"
          onBack={toWaits}
          backLabel="Back to the waits"
          {...(save && rows && rows.length > 0 ? { tools: <CsvButton busy={csv.busy} onPress={save} /> } : {})}
        />
      }
    >
      <View style={{ rowGap: 12, paddingTop: 8 }}>
        <Txt tone="ink2">{about}</Txt>
        {csv.problem ? (
          <Txt tone={csv.down ? 'ink2' : 'alarm'} kind="small" role="alert">
            {csv.problem}
          </Txt>
        ) : null}
        {rows ? (
          rows.length === 0 ? (
            <Empty sentence="No charge stands behind this." action={{ title: 'To the waits', onPress: toWaits }} />
          ) : (
            <>
              <ChargeRows rows={rows} now={address.now} onOpen={(id) => address.go(`/charges/${id}`)} />
              {asked.hasNextPage ? (
                <Button
                  look="line"
                  size="small"
                  title="Show more"
                  busy={asked.isFetchingNextPage}
                  onPress={() => void asked.fetchNextPage()}
                />
              ) : (
                <Txt kind="small" tone="ink2">
                  {rows.length === 1 ? 'That is the one.' : `That is all ${rows.length}.`}
                </Txt>
              )}
            </>
          )
        ) : asked.isError ? (
          <ErrorState
            failed="The charges could not be read."
            toDo={sentenceOf(asked.error)}
            action={{ title: 'Try again', onPress: () => void asked.refetch(), busy: asked.isFetching }}
          />
        ) : (
          <Loading what="the charges" rows={8} onRetry={() => void asked.refetch()} />
        )}
      </View>
    </Screen>
  );
}

/** 'Ready between Mon 13 April and Tue 9 June. Only 2-series 66 Ah, A1.' */
function useAbout({ params, query, period, week, today }: WaitAddressHeld): string {
  const { zone } = useFormats();
  const words = narrowedWords(useFilterChoices(params), params);
  const dayOf = (day: string) => date(instantOfDay(day, 12 * 60, zone), zone, instantOfDay(today, 12 * 60, zone));
  const when = week
    ? `Ready in the week from ${dayOf(week)}`
    : period === 'all'
      ? 'Ready at any time'
      : `Ready from ${dayOf(query.from)} to ${dayOf(query.to)}`;
  return `${when}.${words ? ` Only ${words}.` : ''}`;
}
