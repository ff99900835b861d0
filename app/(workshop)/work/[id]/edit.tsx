import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { isProblem } from '@/shared/client/api-problem';
import { partState } from '@/shared/client/part-state';
import { useWorkItem } from '@/shared/client/work';
import { WorkFormScreen } from '@/shared/screens/work/work-form-screen';
import { useToast } from '@/shared/ui/primitives/toast';
import { FormScreen } from '@/shared/ui/workshop/form-screen';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** Changes a piece of other work. */
export default function EditWork() {
  const router = useRouter();
  const toast = useToast();
  const { id = '' } = useLocalSearchParams<{ id: string }>();
  const work = useWorkItem(id);
  const onBack = () => (router.canGoBack() ? router.back() : router.replace(`/work/${id}` as Href));
  const gone = isProblem(work.error) && work.error.status === 404;
  if (!work.data)
    return (
      <FormScreen
        title="Change other work"
        onBack={onBack}
        what="the work"
        state={gone ? { failed: 'It is not on the list any more.' } : partState(work)}
        onRetry={() => void work.refetch()}
      >
        {null}
      </FormScreen>
    );
  return (
    <WorkFormScreen
      key={id}
      work={work.data}
      repair={null}
      onBack={onBack}
      onDone={({ title }) => {
        toast({ text: `${title} is saved.` });
        onBack();
      }}
    />
  );
}
