import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { useState } from 'react';
import { isProblem } from '@/shared/client/api-problem';
import { useContractForm, wrongSentence } from '@/shared/client/forms';
import { useGate } from '@/shared/client/gate';
import { partState } from '@/shared/client/part-state';
import { useChangeStaffing, useStaffing } from '@/shared/client/staffing';
import { useWorkshop } from '@/shared/client/workshop';
import type { SkillDto, StaffingDto } from '@/shared/contract/staffing';
import type { DayHours } from '@/shared/contract/workshop';
import { useToast } from '@/shared/ui/primitives/toast';
import { Forbidden } from '@/shared/ui/states/forbidden';
import { ChangedMeanwhile, differences } from '@/shared/ui/workshop/changed-meanwhile';
import { FormFoot } from '@/shared/ui/workshop/form-foot';
import { FormScreen, Restored } from '@/shared/ui/workshop/form-screen';
import { StaffingFields } from '@/shared/ui/workshop/staffing-fields';
import { flatStaffing, staffingForm, staffingNames, staffingTexts } from '@/shared/ui/workshop/staffing-form';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

const list = '/workshop?section=staffing' as Href;

/** When one person is there, and what they can do. */
export default function Staffing() {
  const router = useRouter();
  const { id = '' } = useLocalSearchParams<{ id: string }>();
  const gate = useGate('people:write');
  const staffing = useStaffing();
  const workshop = useWorkshop();
  const onBack = () => (router.canGoBack() ? router.back() : router.replace(list));
  const one = staffing.data?.people.find(({ person }) => person.id === id);
  const state = partState(staffing, workshop);
  if (!gate.may || !one || !workshop.data || !staffing.data)
    return (
      <FormScreen
        title={one?.person.name ?? 'Hours of a person'}
        onBack={onBack}
        what="the hours"
        state={!gate.may ? 'ready' : state === 'ready' ? { failed: 'Nobody here has this address.' } : state}
        onRetry={() => [staffing, workshop].forEach((query) => void query.refetch())}
      >
        <Forbidden what="Hours, days off and skills are changed" roles={gate.roles} people={gate.people} />
      </FormScreen>
    );
  return (
    <StaffingForm
      key={id}
      staffing={one}
      skills={staffing.data.skills}
      workshopHours={workshop.data.workingHours}
      onBack={onBack}
    />
  );
}

function StaffingForm({
  staffing,
  skills,
  workshopHours,
  onBack,
}: {
  staffing: StaffingDto;
  skills: readonly SkillDto[];
  workshopHours: readonly DayHours[];
  onBack: () => void;
}) {
  const router = useRouter();
  const toast = useToast();
  const mayList = useGate('workshop:write').may;
  const change = useChangeStaffing();
  const { person } = staffing;
  const [initial] = useState(() => staffingTexts(staffing));
  const f = useContractForm({
    schema: staffingForm,
    initial,
    draft: `staffing.${person.id}`,
    send: async (output) => {
      await change.mutateAsync({ ...output, personId: person.id, rev: f.form.getValues('baseRev') });
      toast({ text: `The hours of ${person.name} are saved.` });
      onBack();
    },
  });
  const present = isProblem(f.error) && f.error.status === 412 ? (f.error.present as StaffingDto) : null;
  const theirs = present ? staffingTexts(present) : null;
  return (
    <FormScreen
      title={person.name}
      sub="Hours, days off, skills"
      onBack={onBack}
      what="the hours"
      state="ready"
      onRetry={() => {}}
      foot={
        <FormFoot
          title="Save hours and skills"
          busy={f.busy}
          wrong={f.wrong > 0 ? wrongSentence(f.wrong) : null}
          problem={theirs ? null : f.problem}
          note="The bench plan is reckoned again with them."
          onPress={() => void f.submit()}
        />
      }
    >
      <Restored restored={f.restored} onAfresh={() => f.clear(staffingTexts(staffing))} />
      {theirs ? (
        <ChangedMeanwhile
          what={`What is known of ${person.name}`}
          differing={differences(staffingNames, flatStaffing(theirs, skills), flatStaffing(f.form.getValues(), skills))}
          busy={f.busy}
          onTakeTheirs={() => f.clear(theirs)}
          onKeepMine={() => {
            f.form.setValue('baseRev', theirs.baseRev);
            void f.submit();
          }}
        />
      ) : null}
      <StaffingFields
        form={f.form}
        workshopHours={workshopHours}
        skills={skills}
        onAddSkill={mayList ? () => router.push('/workshop/skills/new' as Href) : null}
      />
    </FormScreen>
  );
}
