import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { useState } from 'react';
import { View } from 'react-native';
import { sentenceOf } from '@/shared/client/api-problem';
import { useGate } from '@/shared/client/gate';
import { useRepair } from '@/shared/client/repairs';
import type { RepairPageDto } from '@/shared/contract/repair';
import { DecideSource } from '@/shared/screens/pack-reading/decide-source';
import { MeasureSource } from '@/shared/screens/pack-reading/measure-source';
import { Button } from '@/shared/ui/primitives/button';
import { Txt } from '@/shared/ui/primitives/txt';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { Empty } from '@/shared/ui/states/empty';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Forbidden } from '@/shared/ui/states/forbidden';
import { Loading } from '@/shared/ui/states/loading';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** Holds a hand meter against what the pack says, and decides where the two disagree. */
export default function SecondSource() {
  const { id } = useLocalSearchParams<{ id: string }>();
  const router = useRouter();
  const repair = useRepair(id);
  const gate = useGate('repair:write');
  const page = `/repairs/${id}`;
  const go = (to: string) => router.replace(to as Href);
  const back = () => (router.canGoBack() ? router.back() : go(page));
  return (
    <Screen
      single
      header={
        <HeaderBar
          title="Second source"
          sub={repair.data ? `${repair.data.number} · ${repair.data.vehicle}` : undefined}
          onBack={back}
        />
      }
    >
      {!gate.may ? (
        <Forbidden what="Second sources are entered" roles={gate.roles} people={gate.people} />
      ) : repair.data ? (
        <Source key={id} repair={repair.data} onRead={() => go(`${page}/reading`)} onDone={() => go(page)} />
      ) : repair.isError ? (
        <ErrorState
          failed="The repair could not be read."
          toDo={sentenceOf(repair.error)}
          action={{ title: 'Try again', onPress: () => void repair.refetch(), busy: repair.isFetching }}
        />
      ) : (
        <Loading what="the repair" onRetry={() => void repair.refetch()} />
      )}
    </Screen>
  );
}

function Source({ repair, onRead, onDone }: { repair: RepairPageDto; onRead: () => void; onDone: () => void }) {
  const [again, setAgain] = useState(false);
  // Newest first: the latest arrival that counts, and what the meter said of it last.
  const reading = repair.readings.find(({ stage, setAside }) => stage === 'arrival' && setAside === null);
  const source = reading && repair.sources.find(({ readingId }) => readingId === reading.id);
  if (!reading)
    return (
      <Empty
        sentence="No reading of this pack yet. Enter the group voltages first."
        action={{ title: 'Enter the group voltages', onPress: onRead }}
      />
    );
  if (!source || again) return <MeasureSource repair={repair} reading={reading} onSaved={() => setAgain(false)} />;
  if (source.agrees || source.decided)
    return (
      <View style={{ rowGap: 14 }}>
        <Txt bold>
          {source.decided
            ? `${source.decided.by.name} decided: ${source.decided.modulePosition === null ? 'the pack is read again' : `module ${source.decided.modulePosition}`}. ${source.decided.reason}`
            : `The meter agrees with the pack at module ${source.modulePosition}.`}
        </Txt>
        {source.decided?.decision === 'read-again' ? (
          <Button title="Read the pack again" onPress={onRead} />
        ) : (
          <Button title="Go on with the repair" onPress={onDone} />
        )}
        <Button look="line" title="Measure again" onPress={() => setAgain(true)} />
      </View>
    );
  return (
    <DecideSource
      repair={repair}
      reading={reading}
      source={source}
      onMeasure={() => setAgain(true)}
      onDecided={(read) => (read ? onRead() : onDone())}
    />
  );
}
