import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { sentenceOf } from '@/shared/client/api-problem';
import { useGate } from '@/shared/client/gate';
import { useRepair } from '@/shared/client/repairs';
import { ProveRepair } from '@/shared/screens/pack-reading/prove-repair';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Forbidden } from '@/shared/ui/states/forbidden';
import { Loading } from '@/shared/ui/states/loading';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** The spread over the readings, and how many balance charges are still to come. */
export default function Prove() {
  const { id } = useLocalSearchParams<{ id: string }>();
  const router = useRouter();
  const repair = useRepair(id);
  const gate = useGate('repair:read');
  const page = `/repairs/${id}`;
  const back = () => (router.canGoBack() ? router.back() : router.replace(page as Href));
  if (gate.may && repair.data)
    return (
      <ProveRepair key={id} repair={repair.data} onBack={back} onRead={() => router.push(`${page}/reading` as Href)} />
    );
  return (
    <Screen single header={<HeaderBar title="Prove" onBack={back} />}>
      {!gate.may ? (
        <Forbidden what="Repairs are read" roles={gate.roles} people={gate.people} />
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
