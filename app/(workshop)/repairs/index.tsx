import { useRouter, type Href } from 'expo-router';
import { useState } from 'react';
import { useWindowDimensions, View } from 'react-native';
import { sentenceOf } from '@/shared/client/api-problem';
import { serverTimeOf, useNow } from '@/shared/client/clock';
import { useLink } from '@/shared/client/link';
import { useRepairs } from '@/shared/client/repairs';
import { useCan } from '@/shared/client/session';
import { useSettled } from '@/shared/client/settled';
import { ExportLink } from '@/shared/screens/repair/export-link';
import { FoundPart } from '@/shared/screens/repair/found-part';
import { Button } from '@/shared/ui/primitives/button';
import { IconButton } from '@/shared/ui/primitives/icon-button';
import { SearchBox } from '@/shared/ui/primitives/search-box';
import { SegmentSwitch } from '@/shared/ui/primitives/segment-switch';
import { Select } from '@/shared/ui/primitives/select';
import { Txt } from '@/shared/ui/primitives/txt';
import { inView, stateAsked, views, type RepairView } from '@/shared/ui/repair/repair-views';
import { RepairRows } from '@/shared/ui/repair/repair-rows';
import { RepairTable } from '@/shared/ui/repair/repair-table';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { Empty } from '@/shared/ui/states/empty';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Loading } from '@/shared/ui/states/loading';
import { useBreakpoint } from '@/shared/ui/theme/use-breakpoint';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** The table's columns hold their words from this width on, px. */
const TABLE_FROM = 1280;

/** All repairs: what needs somebody first, then by when the module is ready, then by what was promised. */
export default function Repairs() {
  const router = useRouter();
  const now = useNow(60_000);
  const desk = useBreakpoint() === 'wide';
  // Eight columns and a header with search and filters need more than the least desk has.
  const wide = useWindowDimensions().width >= TABLE_FROM;
  const seesDeleted = useCan('repair:delete');
  const [view, setView] = useState<RepairView>('open');
  const [typed, setTyped] = useState('');
  const looked = useSettled(typed.trim(), 250);
  const query = useRepairs({ q: looked, state: stateAsked(view) });
  const pages = query.data?.pages ?? [];
  const counts = pages[0]?.counts;
  const found = pages.flatMap(({ repairs }) => repairs);
  const cards = inView(view, found);
  const old = useLink().state === 'down';
  const at = { now, asOf: serverTimeOf(query.dataUpdatedAt) };
  const open = (id: string) => router.push(`/repairs/${id}` as Href);
  const start = () => router.push('/repairs/new' as Href);
  const search = <SearchBox label="Repair, vehicle, spare or person" value={typed} onChange={setTyped} />;
  const past = view === 'archived' || view === 'deleted';
  const places = (
    <SegmentSwitch<RepairView | 'none'>
      label="Which repairs"
      value={past ? 'none' : view}
      onChange={(next) => next !== 'none' && setView(next)}
      fit="words"
      segments={[
        { value: 'open', label: 'Open', count: counts?.open },
        { value: 'needs', label: wide ? 'Needs somebody' : 'Needs you', count: counts?.needsSomebody },
        { value: 'waiting', label: 'Waiting', count: counts?.waiting },
        { value: 'handed-over', label: wide ? 'Handed over' : 'Over' },
      ]}
    />
  );
  const none = counts?.open === 0 && counts.handedOver === 0 && view === 'open' && looked === '';
  const older = (
    <View style={{ maxWidth: 320 }}>
      <Select<RepairView>
        label="Further repairs"
        size="low"
        value={past ? view : null}
        empty="Archive…"
        options={[
          { value: 'archived', label: 'In the archive' },
          ...(seesDeleted ? [{ value: 'deleted' as const, label: 'Deleted' }] : []),
        ]}
        onChange={setView}
      />
    </View>
  );
  return (
    <Screen
      header={
        <HeaderBar
          title="Repairs"
          sub={wide || !counts ? undefined : `${counts.open} open, ${counts.waiting} waiting for a module`}
          middle={
            wide ? (
              <>
                <View style={{ width: 270 }}>{search}</View>
                {places}
              </>
            ) : undefined
          }
          action={<Button title="Start a repair" icon="plus" size="small" onPress={start} />}
          tools={desk ? undefined : <IconButton icon="plus" label="Start a repair" framed onPress={start} />}
        />
      }
    >
      {query.data ? (
        none ? (
          <View style={{ rowGap: 24 }}>
            <Empty
              sentence="No repairs yet. Start the first when a pack comes in."
              action={{ title: 'Start a repair', icon: 'plus', onPress: start }}
            />
            {older}
          </View>
        ) : (
          <View style={{ rowGap: 12 }}>
            {wide ? null : (
              <>
                {search}
                {places}
              </>
            )}
            {past ? (
              <Txt kind="heading" heading={2}>
                {view === 'archived' ? 'In the archive' : 'Deleted'}
              </Txt>
            ) : null}
            {cards.length === 0 && query.isPlaceholderData ? (
              <Loading what="the repairs" onRetry={() => void query.refetch()} />
            ) : cards.length === 0 && !query.hasNextPage ? (
              <NothingFound view={view} looked={looked} onAll={() => [setTyped(''), setView('open')]} />
            ) : wide ? (
              <RepairTable cards={cards} at={at} old={old} onOpen={open} />
            ) : (
              <RepairRows cards={cards} at={at} old={old} onOpen={open} />
            )}
            <FoundPart looked={looked} listed={cards.map(({ id }) => id)} onGo={(path) => router.push(path as Href)} />
            {query.hasNextPage ? (
              <Button
                look="line"
                size="small"
                title="Show more"
                busy={query.isFetchingNextPage}
                onPress={() => void query.fetchNextPage()}
              />
            ) : null}
            {wide && cards.length > 0 && !past && view !== 'handed-over' ? (
              <Txt kind="small" tone="ink2">
                What needs somebody first, then by module ready, then by due. Arrow keys walk the rows, Enter opens.
              </Txt>
            ) : null}
            {older}
            <ExportLink filter={{ q: looked, state: stateAsked(view) ?? 'open' }} offline={old} />
          </View>
        )
      ) : query.isError ? (
        <ErrorState
          failed="The repairs could not be read."
          toDo={sentenceOf(query.error)}
          action={{ title: 'Try again', onPress: () => void query.refetch(), busy: query.isFetching }}
        />
      ) : (
        <Loading what="the repairs" rows={6} onRetry={() => void query.refetch()} />
      )}
    </Screen>
  );
}

function NothingFound({ view, looked, onAll }: { view: RepairView; looked: string; onAll: () => void }) {
  return (
    <View style={{ rowGap: 12, paddingVertical: 12, alignItems: 'flex-start' }}>
      <Txt>{looked ? `${views[view].none.replace(/\.$/, '')} matches “${looked}”.` : views[view].empty}</Txt>
      <Button look="line" size="small" title="Show the open repairs" onPress={onAll} />
    </View>
  );
}
