import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { ChooseSpare } from '@/shared/screens/pack-reading/choose-spare';
import { RepairStep } from '@/shared/screens/pack-reading/repair-step';
import { Empty } from '@/shared/ui/states/empty';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** Chooses the spare that goes into the pack. */
export default function RepairSpares() {
  const { id } = useLocalSearchParams<{ id: string }>();
  const router = useRouter();
  const go = (to: string) => router.push(to as Href);
  return (
    <RepairStep
      id={id}
      title="Choose a spare"
      capability="repair:write"
      what="Spares are reserved"
      draw={(repair, back) =>
        repair.target && (
          <ChooseSpare
            key={id}
            repair={repair}
            target={repair.target}
            onBack={back}
            onGo={go}
            onStock={() => go('/spares')}
          />
        )
      }
      missing={
        <Empty
          sentence="No target yet. Spares are sorted by the time to it."
          action={{ title: 'Take the target', onPress: () => go(`/repairs/${id}/target`) }}
        />
      }
    />
  );
}
