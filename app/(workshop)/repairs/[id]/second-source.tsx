import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { useState } from 'react';
import { sentenceOf } from '@/shared/client/api-problem';
import { useGate } from '@/shared/client/gate';
import { useRepair } from '@/shared/client/repairs';
import type { RepairPageDto } from '@/shared/contract/repair';
import { DecideSource } from '@/shared/screens/pack-reading/decide-source';
import { MeasureSource } from '@/shared/screens/pack-reading/measure-source';
import { StepScreen } from '@/shared/screens/pack-reading/step-screen';
import { Button } from '@/shared/ui/primitives/button';
import { Txt } from '@/shared/ui/primitives/txt';
import { Foot } from '@/shared/ui/screen/foot';
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
  if (gate.may && repair.data)
    return (
      <Source
        key={id}
        repair={repair.data}
        onBack={back}
        onRead={() => go(`${page}/reading`)}
        onDone={() => go(page)}
      />
    );
  return (
    <Screen single header={<HeaderBar title="Second source" onBack={back} />}>
      {!gate.may ? (
        <Forbidden what="Second sources are entered" roles={gate.roles} people={gate.people} />
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

function Source({
  repair,
  onBack,
  onRead,
  onDone,
}: {
  repair: RepairPageDto;
  onBack: () => void;
  onRead: () => void;
  onDone: () => void;
}) {
  const [again, setAgain] = useState(false);
  // Newest first: the latest arrival that counts, and what the meter said of it last.
  const reading = repair.readings.find(({ stage, setAside }) => stage === 'arrival' && setAside === null);
  const source = reading && repair.sources.find(({ readingId }) => readingId === reading.id);
  if (!reading)
    return (
      <StepScreen title="Second source" repair={repair} onBack={onBack}>
        <Empty
          sentence="No reading of this pack yet. Enter the group voltages first."
          action={{ title: 'Enter the group voltages', onPress: onRead }}
        />
      </StepScreen>
    );
  if (!source || again)
    return (
      <MeasureSource
        repair={repair}
        reading={reading}
        onBack={again ? () => setAgain(false) : onBack}
        onSaved={() => setAgain(false)}
      />
    );
  if (source.agrees || source.decided)
    return (
      <StepScreen
        title="Second source"
        repair={repair}
        onBack={onBack}
        foot={
          <Foot>
            {source.decided?.decision === 'read-again' ? (
              <Button title="Read the pack again" onPress={onRead} />
            ) : (
              <Button title="Go on with the repair" onPress={onDone} />
            )}
          </Foot>
        }
      >
        <Txt bold>
          {source.decided
            ? `${source.decided.by.name} decided: ${source.decided.modulePosition === null ? 'the pack is read again' : `module ${source.decided.modulePosition}`}. ${source.decided.reason}`
            : `The meter agrees with the pack at module ${source.modulePosition}.`}
        </Txt>
        <Button look="line" title="Measure again" onPress={() => setAgain(true)} />
      </StepScreen>
    );
  return (
    <DecideSource
      repair={repair}
      reading={reading}
      source={source}
      onBack={onBack}
      onMeasure={() => setAgain(true)}
      onDecided={(read) => (read ? onRead() : onDone())}
    />
  );
}
