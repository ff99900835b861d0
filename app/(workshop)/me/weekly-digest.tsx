import { useGate } from '@/shared/client/gate';
import { DigestScreen } from '@/shared/screens/waits/digest-screen';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { Forbidden } from '@/shared/ui/states/forbidden';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** The weekly letter about the waits, for managers. */
export default function WeeklyDigest() {
  const { may, roles, people } = useGate('workshop:write');
  if (may) return <DigestScreen />;
  return (
    <Screen header={<HeaderBar title="Weekly letter" />}>
      <Forbidden what="The weekly letter is read" roles={roles} people={people} />
    </Screen>
  );
}
