import { View } from 'react-native';
import { useCan } from '@/shared/client/session';
import { useWork } from '@/shared/client/work';
import type { RepairDto } from '@/shared/contract/repair';
import { Link } from '@/shared/ui/primitives/link';
import { Txt } from '@/shared/ui/primitives/txt';
import { WorkList } from '@/shared/ui/work/work-rows';

/** Other work for a repair: what is open, what is over, and the way to add some. */
export function RepairWorkPart({
  repair,
  now,
  onGo,
}: {
  repair: Pick<RepairDto, 'id' | 'state'>;
  now: number;
  onGo: (path: string) => void;
}) {
  const mayAdd = useCan('work:write') && repair.state === 'open';
  const open = useWork({ state: 'open', repairId: repair.id });
  const over = useWork({ state: 'over', repairId: repair.id });
  const work = [open, over].flatMap(({ data }) => (data?.pages ?? []).flatMap((page) => page.work));
  const known = open.data !== undefined && over.data !== undefined;
  const failed = !known && (open.isError || over.isError);
  const add = `/work/new?repair=${repair.id}`;
  // Handed over without any: there is nothing to say.
  if (known && work.length === 0 && !mayAdd) return null;
  return (
    <View role="region" aria-label="Other work">
      <Txt kind="heading" heading={2}>
        Other work
      </Txt>
      {known && work.length === 0 ? (
        <Txt tone="ink2">None. It is done in the waits of this or another repair.</Txt>
      ) : null}
      {failed ? (
        <View>
          <Txt tone="ink2">Its other work could not be read.</Txt>
          <Link
            kind="small"
            title="read it again"
            onPress={() => [open, over].forEach((query) => void query.refetch())}
          />
        </View>
      ) : null}
      {work.length > 0 ? <WorkList work={work} now={now} within onOpen={(id) => onGo(`/work/${id}`)} /> : null}
      {mayAdd ? <Link title="Add other work" href={add} onPress={() => onGo(add)} /> : null}
    </View>
  );
}
