import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { ProveRepair } from '@/shared/screens/pack-reading/prove-repair';
import { RepairStep } from '@/shared/screens/pack-reading/repair-step';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** The spread over the readings, and how many balance charges are still to come. */
export default function Prove() {
  const { id } = useLocalSearchParams<{ id: string }>();
  const router = useRouter();
  return (
    <RepairStep
      id={id}
      title="Prove"
      capability="repair:read"
      what="Repairs are read"
      draw={(repair, back) => (
        <ProveRepair
          key={id}
          repair={repair}
          onBack={back}
          onRead={() => router.push(`/repairs/${id}/reading` as Href)}
        />
      )}
    />
  );
}
