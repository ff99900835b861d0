import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { sentenceOf } from '@/shared/client/api-problem';
import { useGate } from '@/shared/client/gate';
import { useRepair } from '@/shared/client/repairs';
import { ReadingForm } from '@/shared/screens/pack-reading/reading-form';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Forbidden } from '@/shared/ui/states/forbidden';
import { Loading } from '@/shared/ui/states/loading';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** Reads a pack: the voltages of all its groups. */
export default function PackReading() {
  const { id } = useLocalSearchParams<{ id: string }>();
  const router = useRouter();
  const repair = useRepair(id);
  const gate = useGate('repair:write');
  const back = () => (router.canGoBack() ? router.back() : router.replace(`/repairs/${id}` as Href));
  if (gate.may && repair.data)
    return (
      <ReadingForm
        key={id}
        repair={repair.data}
        onBack={back}
        onSaved={() => router.replace(`/repairs/${id}` as Href)}
      />
    );
  return (
    <Screen single header={<HeaderBar title="Pack reading" onBack={back} />}>
      {!gate.may ? (
        <Forbidden what="Pack readings are entered" roles={gate.roles} people={gate.people} />
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
