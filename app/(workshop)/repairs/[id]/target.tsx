import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { RepairStep } from '@/shared/screens/pack-reading/repair-step';
import { TakeTarget } from '@/shared/screens/pack-reading/take-target';
import { Empty } from '@/shared/ui/states/empty';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** Takes the target that the spare is charged to. */
export default function Target() {
  const { id } = useLocalSearchParams<{ id: string }>();
  const router = useRouter();
  const page = `/repairs/${id}`;
  const read = () => router.replace(`${page}/reading` as Href);
  return (
    <RepairStep
      id={id}
      title="Target"
      capability="repair:write"
      what="Targets are taken"
      draw={(repair, back) =>
        repair.computed && (
          <TakeTarget
            key={id}
            repair={repair}
            computed={repair.computed}
            onBack={back}
            onRead={read}
            onTaken={() => router.dismissTo(page as Href)}
          />
        )
      }
      missing={
        <Empty
          sentence="No target yet: no reading with healthy groups is there."
          action={{ title: 'Enter the group voltages', onPress: read }}
        />
      }
    />
  );
}
