import { useState } from 'react';
import { sentenceOf } from '@/shared/client/api-problem';
import { useNow } from '@/shared/client/clock';
import { useGate } from '@/shared/client/gate';
import { partState } from '@/shared/client/part-state';
import { useRevokeWall, useWalls } from '@/shared/client/walls';
import type { WallDto } from '@/shared/contract/wall';
import { ProblemLine } from '@/shared/ui/auth/problem-line';
import { Button } from '@/shared/ui/primitives/button';
import { ConfirmSheet } from '@/shared/ui/primitives/confirm-sheet';
import { useToast } from '@/shared/ui/primitives/toast';
import { Txt } from '@/shared/ui/primitives/txt';
import { Forbidden } from '@/shared/ui/states/forbidden';
import { whoMay } from '@/shared/ui/workshop/may-change';
import { SectionBlock } from '@/shared/ui/workshop/section-block';
import { WallRows } from '@/shared/ui/workshop/wall-rows';
import type { PartProps } from './part-props';
import { NothingYet } from './part-words';
import { useGo } from './use-go';

/** The walls of the workshop, or who approves them. */
export function WallsPart({ titled }: PartProps) {
  const gate = useGate('wall:approve');
  return gate.may ? (
    <WallList titled={titled} />
  ) : (
    <SectionBlock id="walls" title="Walls" titled={titled} state="ready" what="the walls" onRetry={() => {}}>
      {titled ? (
        <Txt tone="ink2">{whoMay(gate, 'Approved and taken back')}</Txt>
      ) : (
        <Forbidden what="Walls are approved and taken back" roles={gate.roles} people={gate.people} />
      )}
    </SectionBlock>
  );
}

function WallList({ titled }: PartProps) {
  const go = useGo();
  const toast = useToast();
  const now = useNow(30_000);
  const walls = useWalls();
  const revoke = useRevokeWall();
  const mayRevoke = useGate('wall:revoke').may;
  const [asked, setAsked] = useState<WallDto | null>(null);
  return (
    <SectionBlock
      id="walls"
      title="Walls"
      titled={titled}
      state={partState(walls)}
      what="the walls"
      onRetry={() => void walls.refetch()}
    >
      {walls.data?.length === 0 ? (
        <NothingYet words="No screen shows the board yet. Open /wall on one: it shows a code." />
      ) : (
        <WallRows walls={walls.data ?? []} now={now} mayTakeBack={mayRevoke} onTakeBack={setAsked} />
      )}
      <ProblemLine text={revoke.error ? sentenceOf(revoke.error) : null} />
      <Button
        look="line"
        title={walls.data?.length ? 'Approve another wall' : 'Approve a wall'}
        onPress={() => go('/approve')}
      />
      <ConfirmSheet
        open={asked !== null}
        title={`Take back ${asked?.name ?? ''}?`}
        fact="The screen stops showing the board at once, and shows a code again."
        confirm="Take it back"
        safe="Leave it"
        busy={revoke.isPending}
        onClose={() => setAsked(null)}
        onConfirm={() => {
          if (asked)
            revoke.mutate(asked.id, {
              onSuccess: () => toast({ text: `${asked.name} no longer shows the board.` }),
              onSettled: () => setAsked(null),
            });
        }}
      />
    </SectionBlock>
  );
}
