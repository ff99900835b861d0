import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { isProblem, sentenceOf } from '@/shared/client/api-problem';
import { useNow } from '@/shared/client/clock';
import { useWorkItem } from '@/shared/client/work';
import { WorkPage } from '@/shared/screens/work/work-page';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Loading } from '@/shared/ui/states/loading';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** One piece of other work. */
export default function OneWork() {
  const { id = '' } = useLocalSearchParams<{ id: string }>();
  const router = useRouter();
  const now = useNow(60_000);
  const query = useWorkItem(id);
  const back = () => (router.canGoBack() ? router.back() : router.replace('/work' as Href));
  if (query.data)
    return (
      <WorkPage
        key={id}
        work={query.data}
        now={now}
        onBack={back}
        onGo={(path) => router.push(path as Href)}
        onStale={() => void query.refetch()}
      />
    );
  const gone = isProblem(query.error) && query.error.status === 404;
  return (
    <Screen single header={<HeaderBar title="Other work" onBack={back} />}>
      {query.isError ? (
        <ErrorState
          failed={gone ? 'This work is not here.' : 'The work could not be read.'}
          toDo={gone ? 'Look for it in the list.' : sentenceOf(query.error)}
          action={
            gone
              ? { title: 'All other work', onPress: () => router.replace('/work' as Href) }
              : { title: 'Try again', onPress: () => void query.refetch(), busy: query.isFetching }
          }
        />
      ) : (
        <Loading what="the work" rows={6} onRetry={() => void query.refetch()} />
      )}
    </Screen>
  );
}
