import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { Forbidden } from '@/shared/ui/states/forbidden';

/** The waits are not for this role: who reads them. */
export const WaitsForbidden = ({ roles, people }: { roles: string; people: readonly string[] }) => (
  <Screen header={<HeaderBar title="Waits" />}>
    <Forbidden what="Waiting statistics are read" roles={roles} people={people} />
  </Screen>
);
