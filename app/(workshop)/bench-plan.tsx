import { useRouter, type Href } from 'expo-router';
import { useGate } from '@/shared/client/gate';
import { BenchPlanPage } from '@/shared/screens/bench-plan/bench-plan-page';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { Forbidden } from '@/shared/ui/states/forbidden';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** The workshop's day: channels and people on one time line. */
export default function BenchPlan() {
  const gate = useGate('bench:plan');
  return gate.may ? <BenchPlanPage /> : <NotForYou {...gate} />;
}

function NotForYou({ roles, people }: { roles: string; people: readonly string[] }) {
  const router = useRouter();
  return (
    <Screen header={<HeaderBar title="Bench plan" />}>
      <Forbidden
        what="The bench is planned"
        roles={roles}
        people={people}
        action={{ title: 'To my day', onPress: () => router.navigate('/my-day' as Href) }}
      />
    </Screen>
  );
}
