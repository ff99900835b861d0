import { useRouter, type Href } from 'expo-router';
import { RepairFormScreen } from '@/shared/screens/repair/repair-form-screen';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** Starts a repair. */
export default function NewRepair() {
  const router = useRouter();
  return (
    <RepairFormScreen
      repair={null}
      onBack={() => (router.canGoBack() ? router.back() : router.replace('/repairs' as Href))}
      onDone={({ id }) => router.replace(`/repairs/${id}` as Href)}
    />
  );
}
