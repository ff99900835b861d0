import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { ReadingForm } from '@/shared/screens/pack-reading/reading-form';
import { RepairStep } from '@/shared/screens/pack-reading/repair-step';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** Reads a pack: the voltages of all its groups. */
export default function PackReading() {
  const { id } = useLocalSearchParams<{ id: string }>();
  const router = useRouter();
  return (
    <RepairStep
      id={id}
      title="Pack reading"
      capability="repair:write"
      what="Pack readings are entered"
      draw={(repair, back) => (
        <ReadingForm
          key={id}
          repair={repair}
          onBack={back}
          onSaved={() => router.dismissTo(`/repairs/${id}` as Href)}
        />
      )}
    />
  );
}
