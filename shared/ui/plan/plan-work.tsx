import { View } from 'react-native';
import type { PlanOption } from '@/calc/plan-types';
import type { PlanDto } from '@/shared/contract/plan';
import { CallOut } from '../primitives/call-out';
import { Rule } from '../primitives/rule';
import { Txt } from '../primitives/txt';
import { useBreakpoint } from '../theme/use-breakpoint';
import { HowFarToTrustIt, LearnedLine, WhatItTakes } from './plan-trust';
import { PlanWays } from './plan-ways';

/** Every way side by side, and of the chosen one what it takes and how far to trust it. */
export function PlanWork({
  dto,
  chosen,
  readyBy,
  now,
  old,
  onChoose,
  withoutLearned,
  onWithoutLearned,
}: {
  dto: PlanDto;
  chosen: PlanOption | null;
  readyBy: string | null;
  now: number;
  /** The numbers were changed and the next plan is being reckoned. */
  old: boolean;
  onChoose: (optionId: string) => void;
  /** What closed charges have taught of the times is left out. */
  withoutLearned: boolean;
  onWithoutLearned: (without: boolean) => void;
}) {
  const wide = useBreakpoint() === 'wide';
  return (
    <View style={{ rowGap: 16 }} aria-busy={old}>
      {old ? (
        <Txt kind="small" tone="ink2" role="status">
          Reckoning with what you have just typed.
        </Txt>
      ) : null}
      <PlanWays dto={dto} chosen={chosen?.id ?? null} readyBy={readyBy} now={now} onChoose={onChoose} />
      {chosen ? (
        <>
          <Rule gap={0} />
          <View style={wide ? { flexDirection: 'row', columnGap: 24 } : { rowGap: 16 }}>
            <View style={wide ? { flex: 1 } : null}>
              <WhatItTakes option={chosen} channelNames={(id) => dto.channels[id]?.name ?? ''} />
            </View>
            <View style={wide ? { flex: 1 } : null}>
              <HowFarToTrustIt
                option={chosen}
                plan={dto.plan}
                learned={<LearnedLine option={chosen} without={withoutLearned} onWithout={onWithoutLearned} />}
              />
            </View>
          </View>
        </>
      ) : null}
    </View>
  );
}

/** Nothing to charge, or nothing to charge it with. */
export function NoWay({ dto }: { dto: PlanDto }) {
  if (dto.plan.alreadyWithin)
    return (
      <CallOut tone="amber" label="Nothing to charge">
        <Txt bold>Every group is within the tolerance already. Nothing is to be charged.</Txt>
        <Txt>Read it once more with the pack’s meter before it is fitted.</Txt>
      </CallOut>
    );
  return (
    <CallOut tone="amber" label="No way">
      <Txt bold>No channel can do this charge.</Txt>
      <View style={{ rowGap: 4, marginTop: 6 }}>
        {[...new Set(dto.plan.ruledOut.map(({ reason }) => reason))].map((reason) => (
          <Txt key={reason}>{reason}</Txt>
        ))}
      </View>
    </CallOut>
  );
}
