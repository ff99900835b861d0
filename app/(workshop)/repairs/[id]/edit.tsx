import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { partState } from '@/shared/client/part-state';
import { useRepair } from '@/shared/client/repairs';
import { RepairFormScreen } from '@/shared/screens/repair/repair-form-screen';
import { FormScreen } from '@/shared/ui/workshop/form-screen';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** Changes what was booked. */
export default function EditRepair() {
  const { id } = useLocalSearchParams<{ id: string }>();
  const router = useRouter();
  const query = useRepair(id);
  const page = `/repairs/${id}` as Href;
  const back = () => (router.canGoBack() ? router.back() : router.replace(page));
  if (query.data) return <RepairFormScreen key={id} repair={query.data} onBack={back} onDone={back} />;
  return (
    <FormScreen
      title="Change a repair"
      onBack={back}
      what="the repair"
      state={partState(query)}
      onRetry={() => void query.refetch()}
    >
      {null}
    </FormScreen>
  );
}
