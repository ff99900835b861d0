import { View } from 'react-native';
import { useGate } from '@/shared/client/gate';
import { useArchiveRepair, useRestoreRepair } from '@/shared/client/repairs';
import type { RepairPageDto } from '@/shared/contract/repair';
import { Button } from '@/shared/ui/primitives/button';
import { Txt } from '@/shared/ui/primitives/txt';
import { nextOfRepair } from '@/shared/ui/repair/repair-next';
import { problemOfAct } from './act-problem';

/** The one button of a repair's page: the next thing to do. Where it cannot be pressed, why. */
export function NextButton({
  repair,
  mayDecide,
  offline,
  onGo,
  onHandOver,
  onRemoved,
  onFit,
}: {
  repair: RepairPageDto;
  mayDecide: boolean;
  offline: boolean;
  onGo: (path: string) => void;
  onHandOver: () => void;
  onRemoved: () => void;
  onFit: () => void;
}) {
  const archive = useArchiveRepair();
  const restore = useRestoreRepair();
  const gate = useGate('repair:delete');
  const next = nextOfRepair(repair, mayDecide);
  const people = gate.people.length > 0 ? ` (${gate.people.join(', ')})` : '';
  const writes = next.kind !== 'go';
  const why =
    writes && offline
      ? 'No connection: this waits until it is back.'
      : next.kind === 'restore' && !gate.may
        ? `Deleted repairs are brought back by ${gate.roles}${people}.`
        : null;
  const problem = problemOfAct(archive.error ?? restore.error);
  const press = () => {
    if (next.kind === 'go') onGo(next.path);
    else if (next.kind === 'hand-over') onHandOver();
    else if (next.kind === 'removed') onRemoved();
    else if (next.kind === 'fit') onFit();
    else if (next.kind === 'restore') restore.mutate({ id: repair.id });
    else archive.mutate({ id: repair.id, archived: next.kind === 'archive' });
  };
  return (
    <View style={{ rowGap: 8 }}>
      {problem ? (
        <Txt kind="small" tone="alarm" bold role="alert">
          {problem}
        </Txt>
      ) : null}
      {why ? (
        <Txt kind="small" tone="ink2" nativeID="repair-next-why">
          {why}
        </Txt>
      ) : null}
      <Button
        title={next.title}
        disabled={why !== null}
        describedBy={why ? 'repair-next-why' : undefined}
        busy={archive.isPending || restore.isPending}
        onPress={press}
      />
    </View>
  );
}
