import { View } from 'react-native';
import { sentenceOf } from '@/shared/client/api-problem';
import { OtherSpares } from '@/shared/ui/plan/other-spares';
import { isOfTheModule, PlanRefused } from '@/shared/ui/plan/plan-refused';
import { isPlateau, PlanPlateau } from '@/shared/ui/plan/plan-plateau';
import { NoWay, PlanWork } from '@/shared/ui/plan/plan-work';
import { Txt } from '@/shared/ui/primitives/txt';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Loading } from '@/shared/ui/states/loading';
import type { PlanTyped } from '@/shared/ui/plan/plan-typed';
import type { PlanPage } from './use-plan-page';

/** Every way side by side, or why there is none yet. */
export function PlanWaysPart({
  page,
  onTake,
  onChange,
}: {
  page: PlanPage;
  onTake: (spareId: string) => void;
  onChange: (change: Partial<PlanTyped>) => void;
}) {
  const { dto, refused, spare, settled, now, others, plan } = page;
  if (dto && refused && isPlateau(dto.plan.refusals))
    return (
      <PlanPlateau
        refusals={dto.plan.refusals}
        onSoc={() => {
          page.setOpen(true);
          onChange({ targetBy: 'soc' });
        }}
        onAccept={() => onChange({ acceptWideBand: 'yes' })}
      />
    );
  if (dto && refused && spare)
    return (
      <View style={{ rowGap: 20 }}>
        <PlanRefused spare={spare} refusals={dto.plan.refusals} targetVolts={dto.targetVolts} now={now} />
        {dto.plan.refusals.some(isOfTheModule) ? (
          <OtherSpares others={others} clipOnAt={Date.parse(dto.clipOnAt)} onTake={onTake} />
        ) : null}
      </View>
    );
  if (dto && dto.plan.options.length === 0) return <NoWay dto={dto} />;
  if (dto)
    return (
      <PlanWork
        dto={dto}
        chosen={page.chosen}
        readyBy={settled?.readyBy ?? null}
        now={now}
        old={plan.isPlaceholderData}
        onChoose={page.choose}
        withoutLearned={page.typed.withoutLearned === 'yes'}
        onWithoutLearned={(without) => onChange({ withoutLearned: without ? 'yes' : '' })}
      />
    );
  if (plan.isError && settled)
    return (
      <ErrorState
        failed="The ways could not be reckoned."
        safe="Nothing was kept; what you typed is."
        toDo={sentenceOf(plan.error)}
        action={{ title: 'Try again', onPress: () => void plan.refetch(), busy: plan.isFetching }}
      />
    );
  if (settled) return <Loading what="the ways" onRetry={() => void plan.refetch()} />;
  return (
    <Txt tone="ink2">
      Choose a spare and type the pack’s rest voltage. Every way then stands here with its time and band.
    </Txt>
  );
}
