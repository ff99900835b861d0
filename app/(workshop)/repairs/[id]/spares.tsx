import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { sentenceOf } from '@/shared/client/api-problem';
import { useGate } from '@/shared/client/gate';
import { useRepair } from '@/shared/client/repairs';
import { ChooseSpare } from '@/shared/screens/pack-reading/choose-spare';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { Empty } from '@/shared/ui/states/empty';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Forbidden } from '@/shared/ui/states/forbidden';
import { Loading } from '@/shared/ui/states/loading';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** Chooses the spare that goes into the pack. */
export default function RepairSpares() {
  const { id } = useLocalSearchParams<{ id: string }>();
  const router = useRouter();
  const repair = useRepair(id);
  const gate = useGate('repair:write');
  const page = `/repairs/${id}`;
  const go = (to: string) => router.push(to as Href);
  const back = () => (router.canGoBack() ? router.back() : router.replace(page as Href));
  if (gate.may && repair.data?.target)
    return (
      <ChooseSpare
        key={id}
        repair={repair.data}
        target={repair.data.target}
        onBack={back}
        onGo={go}
        onStock={() => go('/spares')}
      />
    );
  return (
    <Screen
      single
      header={
        <HeaderBar
          title="Choose a spare"
          sub={repair.data ? `${repair.data.number} · ${repair.data.vehicle}` : undefined}
          onBack={back}
        />
      }
    >
      {!gate.may ? (
        <Forbidden what="Spares are reserved" roles={gate.roles} people={gate.people} />
      ) : repair.data ? (
        <Empty
          sentence="No target yet. Spares are sorted by the time to it."
          action={{ title: 'Take the target', onPress: () => go(`${page}/target`) }}
        />
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
