import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { isProblem, sentenceOf } from '@/shared/client/api-problem';
import { serverTimeOf, useNow } from '@/shared/client/clock';
import { useRepair } from '@/shared/client/repairs';
import { RepairPage } from '@/shared/screens/repair/repair-page';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Loading } from '@/shared/ui/states/loading';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** One repair, from its booking to its hand-over. */
export default function Repair() {
  const { id } = useLocalSearchParams<{ id: string }>();
  const router = useRouter();
  const now = useNow(60_000);
  const query = useRepair(id);
  const back = () => (router.canGoBack() ? router.back() : router.replace('/repairs' as Href));
  if (query.data)
    return (
      <RepairPage
        key={query.data.id}
        repair={query.data}
        at={{ now, asOf: serverTimeOf(query.dataUpdatedAt) }}
        onBack={back}
        onGo={(path) => router.push(path as Href)}
      />
    );
  const gone = isProblem(query.error) && query.error.status === 404;
  return (
    <Screen header={<HeaderBar title="Repair" onBack={back} />}>
      {query.isError ? (
        <ErrorState
          failed={gone ? 'This repair is not here.' : 'The repair could not be read.'}
          toDo={gone ? 'Look for its number in the list.' : sentenceOf(query.error)}
          action={
            gone
              ? { title: 'All repairs', onPress: () => router.replace('/repairs' as Href) }
              : { title: 'Try again', onPress: () => void query.refetch(), busy: query.isFetching }
          }
        />
      ) : (
        <Loading what="the repair" rows={6} onRetry={() => void query.refetch()} />
      )}
    </Screen>
  );
}
