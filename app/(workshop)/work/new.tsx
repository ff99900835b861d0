import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { isProblem } from '@/shared/client/api-problem';
import { partState } from '@/shared/client/part-state';
import { useRepair } from '@/shared/client/repairs';
import { WorkFormScreen } from '@/shared/screens/work/work-form-screen';
import { useToast } from '@/shared/ui/primitives/toast';
import { FormScreen } from '@/shared/ui/workshop/form-screen';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** Quick add of other work; `?repair=` fills in what it is for. */
export default function NewWork() {
  const router = useRouter();
  const toast = useToast();
  const { repair: repairId = '' } = useLocalSearchParams<{ repair?: string }>();
  const repair = useRepair(repairId);
  const onBack = () => (router.canGoBack() ? router.back() : router.replace('/work' as Href));
  // A repair that is not there any more takes nothing away: the work is then for none.
  const gone = isProblem(repair.error) && repair.error.status === 404;
  const state = repairId === '' || gone ? 'ready' : partState(repair);
  if (state !== 'ready')
    return (
      <FormScreen
        title="Add other work"
        onBack={onBack}
        what="the repair"
        state={state}
        onRetry={() => void repair.refetch()}
      >
        {null}
      </FormScreen>
    );
  return (
    <WorkFormScreen
      work={null}
      repair={repair.data ?? null}
      onBack={onBack}
      onDone={({ title }) => {
        toast({ text: `${title} is on the list.` });
        onBack();
      }}
    />
  );
}
