import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { useState } from 'react';
import { isProblem, sentenceOf } from '@/shared/client/api-problem';
import { useContractForm, wrongSentence } from '@/shared/client/forms';
import { useGate } from '@/shared/client/gate';
import { partState } from '@/shared/client/part-state';
import { useAddSkill, useChangeSkill, useRemoveSkill, useStaffing } from '@/shared/client/staffing';
import { skillSchema, type SkillDto } from '@/shared/contract/staffing';
import { BoundField } from '@/shared/ui/forms/bound';
import { useToast } from '@/shared/ui/primitives/toast';
import { Txt } from '@/shared/ui/primitives/txt';
import { ChangedMeanwhile, differences } from '@/shared/ui/workshop/changed-meanwhile';
import { FormFoot } from '@/shared/ui/workshop/form-foot';
import { FormScreen, Restored } from '@/shared/ui/workshop/form-screen';
import { whoMay } from '@/shared/ui/workshop/may-change';
import { RemoveThing } from '@/shared/ui/workshop/remove-thing';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

const list = '/workshop?section=skills' as Href;
const names = { name: 'Name' };

/** A skill of the workshop's list, or a new one (`new`). */
export default function Skill() {
  const router = useRouter();
  const { id = 'new' } = useLocalSearchParams<{ id: string }>();
  const staffing = useStaffing();
  const onBack = () => (router.canGoBack() ? router.back() : router.replace(list));
  const skill = staffing.data?.skills.find((each) => each.id === id) ?? null;
  const state = partState(staffing);
  const missing = state === 'ready' && id !== 'new' && !skill;
  if (state !== 'ready' || missing)
    return (
      <FormScreen
        title={id === 'new' ? 'New skill' : 'Skill'}
        onBack={onBack}
        what="the skill"
        state={missing ? { failed: 'It is not on the list any more.' } : state}
        onRetry={() => void staffing.refetch()}
      >
        {null}
      </FormScreen>
    );
  return <SkillForm key={id} skill={skill} onBack={onBack} />;
}

function SkillForm({ skill, onBack }: { skill: SkillDto | null; onBack: () => void }) {
  const toast = useToast();
  const gate = useGate('workshop:write');
  const add = useAddSkill();
  const change = useChangeSkill();
  const remove = useRemoveSkill();
  const texts = (of: SkillDto | null) => ({ name: of?.name ?? '', baseRev: of?.rev ?? 0 });
  const [initial] = useState(() => texts(skill));
  const f = useContractForm({
    schema: skillSchema,
    initial,
    draft: `skill.${skill?.id ?? 'new'}`,
    send: async (output) => {
      const rev = f.form.getValues('baseRev');
      const saved = skill ? await change.mutateAsync({ ...output, id: skill.id, rev }) : await add.mutateAsync(output);
      toast({ text: `${saved.name} is saved.` });
      onBack();
    },
  });
  const present = isProblem(f.error) && f.error.status === 412 ? (f.error.present as SkillDto) : null;
  const theirs = present ? texts(present) : null;
  return (
    <FormScreen
      title={skill?.name ?? 'New skill'}
      onBack={onBack}
      what="the skill"
      state="ready"
      onRetry={() => {}}
      foot={
        gate.may ? (
          <FormFoot
            title="Save the skill"
            busy={f.busy}
            wrong={f.wrong > 0 ? wrongSentence(f.wrong) : null}
            problem={theirs ? null : f.problem}
            note={skill ? undefined : 'Who has it is ticked under Hours of people.'}
            onPress={() => void f.submit()}
          />
        ) : undefined
      }
    >
      {gate.may ? null : <Txt tone="ink2">{whoMay(gate)}</Txt>}
      <Restored restored={f.restored} onAfresh={() => f.clear(texts(skill))} />
      {theirs ? (
        <ChangedMeanwhile
          what="This skill"
          differing={differences(names, theirs, f.form.getValues())}
          busy={f.busy}
          onTakeTheirs={() => f.clear(theirs)}
          onKeepMine={() => {
            f.form.setValue('baseRev', theirs.baseRev);
            void f.submit();
          }}
        />
      ) : null}
      <BoundField
        form={f.form}
        name="name"
        label={names.name}
        hint="in your own words: brakes, cooling, body"
        required
        readOnly={!gate.may}
      />
      {gate.may && skill ? (
        <RemoveThing
          name={skill.name}
          thing="skill"
          why={skill.inUse ? 'Work that is not over asks for it. Change that work first.' : null}
          fact="It goes from the list and from the people who have it."
          busy={remove.isPending}
          problem={remove.error ? sentenceOf(remove.error) : null}
          onRemove={(done) =>
            remove.mutate(
              { id: skill.id, rev: skill.rev },
              {
                onSuccess: () => {
                  toast({ text: `${skill.name} is removed.` });
                  onBack();
                },
                onSettled: done,
              },
            )
          }
        />
      ) : null}
    </FormScreen>
  );
}
