import { useNow } from '@/shared/client/clock';
import { useGate } from '@/shared/client/gate';
import { partState } from '@/shared/client/part-state';
import { useStaffing } from '@/shared/client/staffing';
import { useFormats } from '@/shared/ui/format/formats';
import { dayOf } from '@/shared/ui/format/zone';
import { Searched } from '@/shared/ui/primitives/searched';
import { whoMay } from '@/shared/ui/workshop/may-change';
import { SectionBlock } from '@/shared/ui/workshop/section-block';
import { skillNames } from '@/shared/ui/workshop/staffing-form';
import { StaffingTable } from '@/shared/ui/workshop/staffing-tables';
import type { PartProps } from './part-props';
import { useGo } from './use-go';

/** Hours, breaks, days off and skills of people: what the bench plan counts on. */
export function StaffingPart({ titled }: PartProps) {
  const go = useGo();
  const gate = useGate('people:write');
  const { zone } = useFormats();
  const today = dayOf(useNow(60_000), zone);
  const staffing = useStaffing();
  const { people = [], skills = [] } = staffing.data ?? {};
  return (
    <SectionBlock
      id="staffing"
      title="Hours of people"
      titled={titled}
      state={partState(staffing)}
      what="the hours of people"
      onRetry={() => void staffing.refetch()}
      note={whoMay(gate)}
    >
      <Searched
        items={people}
        label="Name or skill"
        one="person"
        textsOf={({ person, skillIds }) => [person.name, skillNames(skillIds, skills)]}
      >
        {(found) => (
          <StaffingTable
            people={found}
            skills={skills}
            today={today}
            mayChange={gate.may}
            onEdit={({ person }) => go(`/workshop/staffing/${person.id}`)}
          />
        )}
      </Searched>
    </SectionBlock>
  );
}
