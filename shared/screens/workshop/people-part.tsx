import { useState } from 'react';
import { sentenceOf } from '@/shared/client/api-problem';
import { useNow } from '@/shared/client/clock';
import { useGate } from '@/shared/client/gate';
import { partState } from '@/shared/client/part-state';
import { useInvitations, usePeople, useRecallInvitation } from '@/shared/client/people';
import { useStaffing } from '@/shared/client/staffing';
import type { InvitationDto } from '@/shared/contract/people';
import { ProblemLine } from '@/shared/ui/auth/problem-line';
import { ConfirmSheet } from '@/shared/ui/primitives/confirm-sheet';
import { Searched } from '@/shared/ui/primitives/searched';
import { useToast } from '@/shared/ui/primitives/toast';
import { Txt } from '@/shared/ui/primitives/txt';
import { whoMay } from '@/shared/ui/workshop/may-change';
import { PeopleTable } from '@/shared/ui/workshop/people-table';
import { roleWords } from '@/shared/ui/workshop/role-words';
import { SectionBlock } from '@/shared/ui/workshop/section-block';
import { skillNames } from '@/shared/ui/workshop/staffing-form';
import type { PartProps } from './part-props';
import { useGo } from './use-go';

/** The people of the workshop, and the invitations that are out. */
export function PeoplePart({ titled }: PartProps) {
  const go = useGo();
  const toast = useToast();
  const now = useNow(30_000);
  const gate = useGate('people:write');
  const people = usePeople();
  const invitations = useInvitations(gate.may);
  // Beside the names only: where it is not known yet, the column stays empty.
  const staffing = useStaffing().data;
  const recall = useRecallInvitation();
  const [asked, setAsked] = useState<InvitationDto | null>(null);
  const retry = () => {
    void people.refetch();
    if (gate.may) void invitations.refetch();
  };
  return (
    <SectionBlock
      id="people"
      title="People and roles"
      titled={titled}
      aside={
        titled ? (
          <Txt kind="small" tone="ink2">
            the role decides what a person may do
          </Txt>
        ) : undefined
      }
      state={gate.may ? partState(people, invitations) : partState(people)}
      what="the people"
      onRetry={retry}
      note={whoMay(gate)}
    >
      <Searched
        items={[
          ...(people.data ?? []).map((person) => ({ person, invitation: null })),
          ...(invitations.data ?? []).map((invitation) => ({ person: null, invitation })),
        ]}
        label="Name, role or e-mail"
        one="person"
        textsOf={({ person, invitation }) => [
          person?.name ?? null,
          (person ?? invitation).email,
          roleWords[(person ?? invitation).role].title,
        ]}
      >
        {(found) => (
          <PeopleTable
            people={found.flatMap(({ person }) => person ?? [])}
            skillsOf={(id) =>
              skillNames(
                staffing?.people.find(({ person }) => person.id === id)?.skillIds ?? [],
                staffing?.skills ?? [],
              )
            }
            invitations={found.flatMap(({ invitation }) => invitation ?? [])}
            now={now}
            mayChange={gate.may}
            onEdit={(person) => go(`/workshop/people/${person.id}`)}
            onRecall={setAsked}
          />
        )}
      </Searched>
      <ProblemLine text={recall.error ? sentenceOf(recall.error) : null} />
      <ConfirmSheet
        open={asked !== null}
        title="Recall the invitation?"
        fact={asked ? `The link for ${asked.email} stops working.` : undefined}
        confirm="Recall it"
        safe="Leave it"
        busy={recall.isPending}
        onClose={() => setAsked(null)}
        onConfirm={() => {
          if (asked)
            recall.mutate(asked.id, {
              onSuccess: () => toast({ text: `The invitation of ${asked.email} is recalled.` }),
              onSettled: () => setAsked(null),
            });
        }}
      />
    </SectionBlock>
  );
}
