import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { useState } from 'react';
import type { RepairPageDto } from '@/shared/contract/repair';
import { DecideSource } from '@/shared/screens/pack-reading/decide-source';
import { MeasureSource } from '@/shared/screens/pack-reading/measure-source';
import { RepairStep } from '@/shared/screens/pack-reading/repair-step';
import { StepScreen } from '@/shared/screens/pack-reading/step-screen';
import { Button } from '@/shared/ui/primitives/button';
import { Txt } from '@/shared/ui/primitives/txt';
import { Foot } from '@/shared/ui/screen/foot';
import { Empty } from '@/shared/ui/states/empty';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** Holds a hand meter against what the pack says, and decides where the two disagree. */
export default function SecondSource() {
  const { id } = useLocalSearchParams<{ id: string }>();
  const router = useRouter();
  const page = `/repairs/${id}`;
  return (
    <RepairStep
      id={id}
      title="Second source"
      capability="repair:write"
      what="Second sources are entered"
      draw={(repair, back) => (
        <Source
          key={id}
          repair={repair}
          onBack={back}
          onRead={() => router.replace(`${page}/reading` as Href)}
          onDone={() => router.dismissTo(page as Href)}
        />
      )}
    />
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
