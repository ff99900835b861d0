import { useRouter, type Href } from 'expo-router';
import { KeepActs } from '@/shared/screens/plan/keep-acts';
import { PlanFacts } from '@/shared/screens/plan/plan-facts';
import { PlanHeader } from '@/shared/screens/plan/plan-header';
import { PlanSide } from '@/shared/screens/plan/plan-side';
import { PlanWaysPart } from '@/shared/screens/plan/plan-ways-part';
import { RefusedFoot } from '@/shared/screens/plan/refused-foot';
import { useKeep } from '@/shared/screens/plan/use-keep';
import { usePlanPage } from '@/shared/screens/plan/use-plan-page';
import { OutcomeLine } from '@/shared/ui/plan/plan-outcome';
import { isPlateau } from '@/shared/ui/plan/plan-plateau';
import type { PlanTyped } from '@/shared/ui/plan/plan-typed';
import { Columns } from '@/shared/ui/screen/columns';
import { Foot } from '@/shared/ui/screen/foot';
import { Screen } from '@/shared/ui/screen/screen';
import { useBreakpoint } from '@/shared/ui/theme/use-breakpoint';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** Plan a charge: from spare to pack, every way side by side. */
export default function Plan() {
  const router = useRouter();
  const wide = useBreakpoint() === 'wide';
  const page = usePlanPage();
  const keep = useKeep(page);
  const { dto, chosen, refused, spare, others, typed, now } = page;
  const change = (next: Partial<PlanTyped>) => {
    keep.reset();
    page.change(next);
  };
  const take = (spareId: string) => {
    page.choose(null);
    change({ spareId });
  };
  const acts = <KeepActs page={page} keep={keep} />;
  const plateau = dto !== null && isPlateau(dto.plan.refusals);
  const foot = plateau ? undefined : refused ? (
    <RefusedFoot
      spare={spare}
      next={others[0]?.spare ?? null}
      onQuarantine={() => router.push(`/spares/${typed.spareId}?quarantine=1` as Href)}
      onTake={take}
    />
  ) : wide ? undefined : (
    <Foot note={dto && chosen ? <OutcomeLine dto={dto} option={chosen} now={now} /> : undefined}>{acts}</Foot>
  );
  return (
    <Screen header={<PlanHeader page={page} />} foot={foot}>
      <Columns
        order={['facts', 'work', 'side']}
        facts={<PlanFacts page={page} onChange={change} />}
        work={<PlanWaysPart page={page} onTake={take} onChange={change} />}
        side={<PlanSide page={page} acts={acts} />}
      />
    </Screen>
  );
}
