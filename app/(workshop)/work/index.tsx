import { useRouter, type Href } from 'expo-router';
import { useState } from 'react';
import { View } from 'react-native';
import { sentenceOf } from '@/shared/client/api-problem';
import { useNow } from '@/shared/client/clock';
import { useGate } from '@/shared/client/gate';
import { useCan } from '@/shared/client/session';
import { useWork } from '@/shared/client/work';
import { clock } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { Button } from '@/shared/ui/primitives/button';
import { IconButton } from '@/shared/ui/primitives/icon-button';
import { SegmentSwitch } from '@/shared/ui/primitives/segment-switch';
import { Txt } from '@/shared/ui/primitives/txt';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { Empty } from '@/shared/ui/states/empty';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Forbidden } from '@/shared/ui/states/forbidden';
import { Loading } from '@/shared/ui/states/loading';
import { useBreakpoint } from '@/shared/ui/theme/use-breakpoint';
import { WorkRows } from '@/shared/ui/work/work-rows';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

type Which = 'open' | 'over';

/** Other work: what is to be done in the waits, and what is over. */
export default function OtherWork() {
  const router = useRouter();
  const { zone, marks } = useFormats();
  const now = useNow(60_000);
  const wide = useBreakpoint() === 'wide';
  const gate = useGate('work:read');
  const mayAdd = useCan('work:write');
  const [which, setWhich] = useState<Which>('open');
  const query = useWork({ state: which });
  const pages = query.data?.pages ?? [];
  const counts = pages[0]?.counts;
  const work = pages.flatMap((page) => page.work);
  const open = counts ? counts.open + counts.taken + counts.begun : 0;
  const add = () => router.push('/work/new' as Href);
  const none = counts !== undefined && open === 0 && counts.over === 0;
  return (
    <Screen
      header={
        <HeaderBar
          title="Other work"
          sub={counts ? `${counts.open} open, ${counts.taken} taken, ${counts.begun} begun` : undefined}
          clock={wide ? clock(now, zone, marks) : undefined}
          action={mayAdd ? <Button title="Add other work" icon="plus" size="small" onPress={add} /> : undefined}
          tools={mayAdd && !wide ? <IconButton icon="plus" label="Add other work" framed onPress={add} /> : undefined}
        />
      }
    >
      {!gate.may ? (
        <Forbidden what="Other work is seen" roles={gate.roles} people={gate.people} />
      ) : query.data ? (
        none ? (
          <Empty
            sentence="No other work yet. Add a piece, and it is offered where it fits a wait."
            action={mayAdd ? { title: 'Add other work', icon: 'plus', onPress: add } : undefined}
          />
        ) : (
          <View style={{ rowGap: 12 }}>
            <View style={wide ? { width: 280 } : null}>
              <SegmentSwitch<Which>
                label="Which work"
                value={which}
                onChange={setWhich}
                segments={[
                  { value: 'open', label: 'Open', count: counts ? open : undefined },
                  { value: 'over', label: 'Over', count: counts?.over },
                ]}
              />
            </View>
            {work.length > 0 ? (
              <WorkRows work={work} now={now} onOpen={(id) => router.push(`/work/${id}` as Href)} />
            ) : query.isPlaceholderData ? (
              <Loading what="the work" onRetry={() => void query.refetch()} />
            ) : (
              <Txt>{which === 'open' ? 'All of it is done or dropped.' : 'Nothing was done or dropped yet.'}</Txt>
            )}
            {query.hasNextPage ? (
              <Button
                look="line"
                size="small"
                title="Show more"
                busy={query.isFetchingNextPage}
                onPress={() => void query.fetchNextPage()}
              />
            ) : null}
          </View>
        )
      ) : query.isError ? (
        <ErrorState
          failed="The work could not be read."
          toDo={sentenceOf(query.error)}
          action={{ title: 'Try again', onPress: () => void query.refetch(), busy: query.isFetching }}
        />
      ) : (
        <Loading what="the work" rows={6} onRetry={() => void query.refetch()} />
      )}
    </Screen>
  );
}
