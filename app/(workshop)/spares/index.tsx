import { useRouter, type Href } from 'expo-router';
import { useState } from 'react';
import { View } from 'react-native';
import { sentenceOf } from '@/shared/client/api-problem';
import { useBoard } from '@/shared/client/board';
import { useNow } from '@/shared/client/clock';
import { useModuleTypes } from '@/shared/client/module-types';
import { isScanned } from '@/shared/client/scanned-spare';
import { useSpares } from '@/shared/client/spares';
import { ScanButton } from '@/shared/screens/scan/scan-button';
import { Button } from '@/shared/ui/primitives/button';
import { IconButton } from '@/shared/ui/primitives/icon-button';
import { SearchBox } from '@/shared/ui/primitives/search-box';
import { SegmentSwitch } from '@/shared/ui/primitives/segment-switch';
import { Txt } from '@/shared/ui/primitives/txt';
import { Columns } from '@/shared/ui/screen/columns';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { SpareList } from '@/shared/ui/spare/spare-list';
import { stockItems } from '@/shared/ui/spare/spare-model';
import { SpareSide } from '@/shared/ui/spare/spare-side';
import { SpareTable } from '@/shared/ui/spare/spare-table';
import { matches, shelfOrder } from '@/shared/ui/spare/spare-words';
import { Empty } from '@/shared/ui/states/empty';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Loading } from '@/shared/ui/states/loading';
import { useBreakpoint } from '@/shared/ui/theme/use-breakpoint';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

type Where = 'all' | 'shelf' | 'charge' | 'quarantine';

/** The stock: where each spare is, what it holds, what it rests at. */
export default function Spares() {
  const router = useRouter();
  const now = useNow(60_000);
  const wide = useBreakpoint() === 'wide';
  const stock = useSpares();
  const board = useBoard();
  const types = useModuleTypes();
  const [looked, setLooked] = useState('');
  const [where, setWhere] = useState<Where>('all');
  const all = stock.data ?? [];
  const found = shelfOrder(all.filter((spare) => matches(spare, looked)));
  const count = (place: Where) =>
    place === 'all' ? found.length : found.filter((spare) => spare.where === place).length;
  const items = stockItems(
    found.filter((spare) => where === 'all' || spare.where === where),
    board.data?.charges,
  );
  const open = (id: string) => router.push(`/spares/${id}` as Href);
  const takeIn = () => router.push('/spares/new' as Href);
  const shelf = all.filter((spare) => spare.where === 'shelf').length;
  const quarantine = all.filter((spare) => spare.where === 'quarantine').length;
  const scan = (
    <ScanButton
      onSpare={(scanned) => {
        const spare = all.find((one) => isScanned(scanned, one));
        if (!spare) return `${scanned.label} is not in stock here. Take it in, or scan another.`;
        open(spare.id);
        return null;
      }}
    />
  );
  const search = <SearchBox label="Label, type or shelf" value={looked} onChange={setLooked} />;
  const places = (
    <SegmentSwitch<Where>
      label="Where"
      value={where}
      onChange={setWhere}
      fit="words"
      segments={[
        { value: 'all', label: 'All', count: count('all') },
        { value: 'shelf', label: 'Shelf', count: count('shelf') },
        { value: 'charge', label: wide ? 'On a charge' : 'Charge', count: count('charge') },
        { value: 'quarantine', label: 'Quarantine', count: count('quarantine') },
      ]}
    />
  );
  return (
    <Screen
      header={
        <HeaderBar
          title="Spares"
          sub={
            wide || !stock.data
              ? undefined
              : `${all.length} modules, ${shelf} on the shelf, ${quarantine} in quarantine`
          }
          middle={
            stock.data && all.length > 0 ? (
              <>
                <View style={{ width: 270 }}>{search}</View>
                {places}
                {scan}
              </>
            ) : undefined
          }
          action={<Button title="Take in a spare" icon="plus" size="small" onPress={takeIn} />}
          tools={wide ? undefined : <IconButton icon="plus" label="Take in a spare" framed onPress={takeIn} />}
        />
      }
    >
      {stock.data ? (
        all.length === 0 ? (
          <Empty
            sentence="No spares yet. Take the first one in."
            action={{ title: 'Take in a spare', icon: 'plus', onPress: takeIn }}
          />
        ) : (
          <View style={{ rowGap: 12 }}>
            {wide ? null : (
              <>
                {search}
                {scan}
                {places}
              </>
            )}
            {items.length === 0 ? (
              <NothingFound looked={looked} where={where} onAll={() => [setLooked(''), setWhere('all')]} />
            ) : wide ? (
              <Columns
                work={
                  <SpareTable
                    items={items}
                    ratedAh={new Map((types.data ?? []).map((type) => [type.id, type.ratedAh]))}
                    now={now}
                    onOpen={open}
                  />
                }
                side={<SpareSide items={stockItems(found, board.data?.charges)} now={now} onOpen={open} />}
              />
            ) : (
              <SpareList items={items} now={now} onOpen={open} />
            )}
          </View>
        )
      ) : stock.isError ? (
        <ErrorState
          failed="The stock could not be read."
          toDo={sentenceOf(stock.error)}
          action={{ title: 'Try again', onPress: () => void stock.refetch(), busy: stock.isFetching }}
        />
      ) : (
        <Loading what="the stock" rows={6} onRetry={() => void stock.refetch()} />
      )}
    </Screen>
  );
}

function NothingFound({ looked, where, onAll }: { looked: string; where: Where; onAll: () => void }) {
  const place = { all: '', shelf: ' on the shelf', charge: ' on a charge', quarantine: ' in quarantine' }[where];
  return (
    <View style={{ rowGap: 12, paddingVertical: 12, alignItems: 'flex-start' }}>
      <Txt>{looked.trim() ? `No spare${place} matches “${looked.trim()}”.` : `No spare is${place}.`}</Txt>
      <Button look="line" size="small" title="Show all spares" onPress={onAll} />
    </View>
  );
}
