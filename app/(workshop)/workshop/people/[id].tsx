import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { useState } from 'react';
import { useController } from 'react-hook-form';
import { View } from 'react-native';
import { isProblem, sentenceOf } from '@/shared/client/api-problem';
import { useNow } from '@/shared/client/clock';
import { useContractForm, wrongSentence } from '@/shared/client/forms';
import { useGate } from '@/shared/client/gate';
import { partState } from '@/shared/client/part-state';
import { useChangePerson, usePeople, useResetLink } from '@/shared/client/people';
import { useMember } from '@/shared/client/session';
import { changePersonSchema, type PersonDto } from '@/shared/contract/people';
import { roles, type Role } from '@/shared/contract/roles';
import { ProblemLine } from '@/shared/ui/auth/problem-line';
import { Button } from '@/shared/ui/primitives/button';
import { ChoiceList } from '@/shared/ui/primitives/choice-row';
import { ConfirmSheet } from '@/shared/ui/primitives/confirm-sheet';
import { Link } from '@/shared/ui/primitives/link';
import { Rule } from '@/shared/ui/primitives/rule';
import { useToast } from '@/shared/ui/primitives/toast';
import { Txt } from '@/shared/ui/primitives/txt';
import { Forbidden } from '@/shared/ui/states/forbidden';
import { BoundField } from '@/shared/ui/forms/bound';
import { ChangedMeanwhile, differences } from '@/shared/ui/workshop/changed-meanwhile';
import { FormFoot } from '@/shared/ui/workshop/form-foot';
import { FormScreen, Restored } from '@/shared/ui/workshop/form-screen';
import { OneUseLink } from '@/shared/ui/workshop/one-use-link';
import { roleWords } from '@/shared/ui/workshop/role-words';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

const list = '/workshop?section=people' as Href;
const names = { name: 'Name', role: 'Role', disabled: 'Signs in' };
const words = (of: { name: string; role: Role; disabled: boolean }) => ({
  name: of.name,
  role: roleWords[of.role].title,
  disabled: !of.disabled,
});

/** One person: name, role, a link for a new password, and switching the sign-in off. */
export default function Person() {
  const router = useRouter();
  const { id = '' } = useLocalSearchParams<{ id: string }>();
  const gate = useGate('people:write');
  const people = usePeople();
  const person = people.data?.find((each) => each.id === id);
  const onBack = () => (router.canGoBack() ? router.back() : router.replace(list));
  const state = partState(people);
  if (!gate.may || !person)
    return (
      <FormScreen
        title={person?.name ?? 'Person'}
        onBack={onBack}
        what="the person"
        state={!gate.may ? 'ready' : state === 'ready' ? { failed: 'Nobody here has this address.' } : state}
        onRetry={() => void people.refetch()}
      >
        <Forbidden what="People are changed" roles={gate.roles} people={gate.people} />
      </FormScreen>
    );
  const managers = (people.data ?? []).filter((each) => each.role === 'manager' && !each.disabled);
  const only = managers.length === 1 && managers[0]?.id === person.id;
  return <PersonForm key={id} person={person} onlyManager={only} onBack={onBack} />;
}

function PersonForm({ person, onlyManager, onBack }: { person: PersonDto; onlyManager: boolean; onBack: () => void }) {
  const router = useRouter();
  const toast = useToast();
  const change = useChangePerson();
  const texts = (of: PersonDto) => ({ name: of.name, role: of.role, baseRev: of.rev });
  const [initial] = useState(() => texts(person));
  const f = useContractForm({
    schema: changePersonSchema,
    initial,
    draft: `person.${person.id}`,
    send: async (output) => {
      const rev = f.form.getValues('baseRev');
      const saved = await change.mutateAsync({ name: output.name, role: output.role, id: person.id, rev });
      toast({ text: `${saved.name} is saved.` });
      onBack();
    },
  });
  const role = useController({ control: f.form.control, name: 'role' });
  const present = isProblem(f.error) && f.error.status === 412 ? (f.error.present as PersonDto) : null;
  const why = onlyManager ? `${person.name} is the only manager. Make somebody else a manager first.` : null;
  return (
    <FormScreen
      title={person.name}
      sub={person.disabled ? `${person.email} · disabled` : person.email}
      onBack={onBack}
      what="the person"
      state="ready"
      onRetry={() => {}}
      foot={
        <FormFoot
          title="Save the person"
          busy={f.busy}
          wrong={f.wrong > 0 ? wrongSentence(f.wrong) : null}
          problem={present ? null : f.problem}
          onPress={() => void f.submit()}
        />
      }
    >
      <Restored restored={f.restored} onAfresh={() => f.clear(texts(person))} />
      {present ? (
        <ChangedMeanwhile
          what={present.name}
          differing={differences(names, words(present), words({ ...f.form.getValues(), disabled: present.disabled }))}
          busy={f.busy}
          onTakeTheirs={() => f.clear(texts(present))}
          onKeepMine={() => {
            f.form.setValue('baseRev', present.rev);
            void f.submit();
          }}
        />
      ) : null}
      <BoundField form={f.form} name="name" label="Name" required autoComplete="off" />
      <View>
        <Txt kind="label" style={{ marginBottom: 4 }}>
          Role
        </Txt>
        <ChoiceList
          label="Role"
          value={role.field.value}
          choices={roles.map((value) => ({ value, ...roleWords[value], disabled: onlyManager && value !== 'manager' }))}
          onChange={role.field.onChange}
          outset={0}
        />
        {why ? (
          <Txt kind="small" tone="ink2">
            {why}
          </Txt>
        ) : null}
      </View>
      <Link
        title="Hours, days off and skills"
        href={`/workshop/staffing/${person.id}`}
        onPress={() => router.push(`/workshop/staffing/${person.id}` as Href)}
      />
      <Rule gap={0} />
      <SignIn person={person} why={why} onRev={(rev) => f.form.setValue('baseRev', rev)} />
    </FormScreen>
  );
}

/** Password and sign-in: acts at once, apart from the form. */
function SignIn({
  person,
  why,
  onRev,
}: {
  person: PersonDto;
  why: string | null;
  /** The revision after the switch, so that the form's own saving is not refused for it. */
  onRev: (rev: number) => void;
}) {
  const toast = useToast();
  const me = useMember().person.id === person.id;
  const now = useNow(60_000);
  const link = useResetLink();
  const change = useChangePerson();
  const [asked, setAsked] = useState(false);
  const first = person.name.split(' ')[0] ?? person.name;
  const turn = (disabled: boolean) =>
    change.mutate(
      { id: person.id, rev: person.rev, disabled },
      {
        onSuccess: (saved) => {
          onRev(saved.rev);
          toast({
            text: disabled ? `${person.name} is disabled and signed out.` : `${person.name} can sign in again.`,
          });
        },
        onSettled: () => setAsked(false),
      },
    );
  const reason = why ?? (me ? 'Your own sign-in is disabled by another manager.' : null);
  const failed = link.error ?? change.error;
  return (
    <View style={{ rowGap: 12 }}>
      <Txt kind="heading" heading={2}>
        Password and sign-in
      </Txt>
      {link.data ? (
        <OneUseLink link={link.data} forWhom={person.name} now={now} />
      ) : (
        <>
          <Button
            look="line"
            title="Make a link for a new password"
            busy={link.isPending}
            disabled={person.disabled}
            onPress={() => link.mutate({ personId: person.id })}
          />
          <Txt kind="small" tone="ink2">
            {person.disabled
              ? 'Disabled: let them sign in first.'
              : 'Works once, for 72 hours. The old password works until the new one is set.'}
          </Txt>
        </>
      )}
      <ProblemLine text={failed ? sentenceOf(failed) : null} />
      {person.disabled ? (
        <Button look="line" title={`Let ${first} sign in again`} busy={change.isPending} onPress={() => turn(false)} />
      ) : (
        <>
          {reason ? (
            <Txt kind="small" tone="ink2" nativeID="disable-why">
              {reason}
            </Txt>
          ) : null}
          <Button
            look="line"
            title={`Disable ${first}`}
            disabled={reason !== null}
            describedBy={reason ? 'disable-why' : undefined}
            onPress={() => setAsked(true)}
          />
        </>
      )}
      <ConfirmSheet
        open={asked}
        title={`Disable ${person.name}?`}
        fact="Signed out everywhere at once, and links made for a new password stop working. Charges and readings keep the name."
        confirm={`Disable ${first}`}
        safe="Leave it"
        busy={change.isPending}
        onClose={() => setAsked(false)}
        onConfirm={() => turn(true)}
      />
    </View>
  );
}
