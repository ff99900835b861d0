import { useRouter, type Href } from 'expo-router';
import type { ReactElement } from 'react';
import { sentenceOf } from '@/shared/client/api-problem';
import { useGate } from '@/shared/client/gate';
import { useRepair } from '@/shared/client/repairs';
import type { RepairPageDto } from '@/shared/contract/repair';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Forbidden } from '@/shared/ui/states/forbidden';
import { Loading } from '@/shared/ui/states/loading';

/**
 * A step of a repair on a screen of its own: drawn once the repair is there, for those who may.
 *
 * @param what is done here, for those who may not: 'Targets are taken'
 * @param draw the step; null where something is missing for it
 * @param missing says what, and what comes first
 */
export function RepairStep({
  id,
  title,
  capability,
  what,
  draw,
  missing = null,
}: {
  id: string;
  title: string;
  capability: Parameters<typeof useGate>[0];
  what: string;
  draw: (repair: RepairPageDto, back: () => void) => ReactElement | null;
  missing?: ReactElement | null;
}) {
  const router = useRouter();
  const repair = useRepair(id);
  const gate = useGate(capability);
  const back = () => (router.canGoBack() ? router.back() : router.replace(`/repairs/${id}` as Href));
  const step = gate.may && repair.data ? draw(repair.data, back) : null;
  if (step) return step;
  const sub = repair.data ? `${repair.data.number} · ${repair.data.vehicle}` : undefined;
  return (
    <Screen single header={<HeaderBar title={title} sub={sub} onBack={back} />}>
      {!gate.may ? (
        <Forbidden what={what} roles={gate.roles} people={gate.people} />
      ) : repair.data ? (
        missing
      ) : repair.isError ? (
        <ErrorState
          failed="The repair could not be read."
          toDo={sentenceOf(repair.error)}
          action={{ title: 'Try again', onPress: () => void repair.refetch(), busy: repair.isFetching }}
        />
      ) : (
        <Loading what="the repair" onRetry={() => void repair.refetch()} />
      )}
    </Screen>
  );
}
