import { useGate } from '@/shared/client/gate';
import { partState } from '@/shared/client/part-state';
import { useStaffing } from '@/shared/client/staffing';
import { Searched } from '@/shared/ui/primitives/searched';
import { whoMay } from '@/shared/ui/workshop/may-change';
import { SectionBlock } from '@/shared/ui/workshop/section-block';
import { SkillsTable } from '@/shared/ui/workshop/staffing-tables';
import { AddLink } from './add-link';
import type { PartProps } from './part-props';
import { NothingYet } from './part-words';
import { useGo } from './use-go';

/** The workshop's own list of skills. */
export function SkillsPart({ titled }: PartProps) {
  const go = useGo();
  const gate = useGate('workshop:write');
  const staffing = useStaffing();
  const skills = staffing.data?.skills ?? [];
  return (
    <SectionBlock
      id="skills"
      title="Skills"
      titled={titled}
      aside={<AddLink title="add a skill" href="/workshop/skills/new" may={gate.may} />}
      state={partState(staffing)}
      what="the skills"
      onRetry={() => void staffing.refetch()}
      note={whoMay(gate)}
    >
      {skills.length === 0 ? (
        <NothingYet words="No skill yet. Other work is then offered to everybody." />
      ) : (
        <Searched items={skills} label="Name of the skill" one="skill" textsOf={({ name }) => [name]}>
          {(found) => (
            <SkillsTable skills={found} mayChange={gate.may} onEdit={({ id }) => go(`/workshop/skills/${id}`)} />
          )}
        </Searched>
      )}
    </SectionBlock>
  );
}
