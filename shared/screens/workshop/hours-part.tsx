import { useGate } from '@/shared/client/gate';
import { partState } from '@/shared/client/part-state';
import { useWorkshop } from '@/shared/client/workshop';
import { whoMay } from '@/shared/ui/workshop/may-change';
import { SectionBlock } from '@/shared/ui/workshop/section-block';
import { HourFacts } from '@/shared/ui/workshop/settings-facts';
import { AddLink } from './add-link';
import type { PartProps } from './part-props';

/** Name, time zone and working hours. */
export function HoursPart({ titled }: PartProps) {
  const gate = useGate('workshop:write');
  const workshop = useWorkshop();
  return (
    <SectionBlock
      id="hours"
      title="Name and hours"
      titled={titled}
      aside={<AddLink title="change name and hours" href="/workshop/hours" may={gate.may} />}
      state={partState(workshop)}
      what="name and hours"
      onRetry={() => void workshop.refetch()}
      note={whoMay(gate)}
    >
      {workshop.data ? <HourFacts workshop={workshop.data} /> : null}
    </SectionBlock>
  );
}
