import { useGate } from '@/shared/client/gate';
import { partState } from '@/shared/client/part-state';
import { useWorkshop } from '@/shared/client/workshop';
import { whoMay } from '@/shared/ui/workshop/may-change';
import { SectionBlock } from '@/shared/ui/workshop/section-block';
import { LimitFacts } from '@/shared/ui/workshop/settings-facts';
import { AddLink } from './add-link';
import type { PartProps } from './part-props';

/** The limits that plans and alerts keep to. */
export function LimitsPart({ titled }: PartProps) {
  const gate = useGate('workshop:write');
  const workshop = useWorkshop();
  return (
    <SectionBlock
      id="limits"
      title="Limits"
      titled={titled}
      aside={<AddLink title="change the limits" href="/workshop/limits" may={gate.may} />}
      state={partState(workshop)}
      what="the limits"
      onRetry={() => void workshop.refetch()}
      note={whoMay(gate)}
    >
      {workshop.data ? <LimitFacts workshop={workshop.data} /> : null}
    </SectionBlock>
  );
}
