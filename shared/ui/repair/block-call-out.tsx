import type { RepairBlock } from '@/shared/contract/repair';
import { CallOut } from '../primitives/call-out';
import { Txt } from '../primitives/txt';
import { StageTag } from '../stage/stage-tag';

/** What keeps a repair from going on, and who may decide. */
export function BlockCallOut({
  block,
  deciders,
}: {
  block: RepairBlock;
  /** 'a foreman or a manager (Hella)'; null: this person may, or nobody has to. */
  deciders: string | null;
}) {
  const odd = block.code === 'charge-odd';
  return (
    <CallOut tone={odd ? 'red' : 'amber'} label="What blocks it">
      <StageTag stage={odd ? 'overdue' : 'check-due'} text="It does not go on" />
      <Txt bold style={{ marginTop: 6 }}>
        {block.text}
      </Txt>
      {block.code === 'sources-disagree' ? (
        <Txt tone="ink2">
          {deciders ? `It is decided by ${deciders}.` : 'Someone must decide before it goes on. You may.'}
        </Txt>
      ) : null}
    </CallOut>
  );
}
