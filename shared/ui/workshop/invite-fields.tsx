import { useController } from 'react-hook-form';
import { View } from 'react-native';
import { roles, type Role } from '@/shared/contract/roles';
import { ProblemLine } from '../auth/problem-line';
import { Button } from '../primitives/button';
import { ChoiceList } from '../primitives/choice-row';
import { Txt } from '../primitives/txt';
import { BoundField, type TypedForm } from '../forms/bound';
import { roleWords } from './role-words';

export interface InviteTexts {
  email: string;
  role: Role;
}

/** Who to invite, and as what. */
export function InviteFields({
  form,
  busy,
  problem,
  onSend,
}: {
  form: TypedForm<InviteTexts>;
  busy: boolean;
  problem: string | null;
  onSend: () => void;
}) {
  const role = useController({ control: form.control, name: 'role' });
  return (
    <View style={{ rowGap: 12 }}>
      <Txt kind="heading" heading={2}>
        Invite a person
      </Txt>
      <BoundField
        form={form}
        name="email"
        label="E-mail"
        kind="email"
        autoComplete="off"
        onSubmit={onSend}
        nextKey="send"
      />
      <View>
        <Txt kind="label" style={{ marginBottom: 4 }}>
          Role
        </Txt>
        <ChoiceList
          label="Role"
          value={role.field.value}
          choices={roles.map((value) => ({ value, ...roleWords[value] }))}
          onChange={role.field.onChange}
          outset={12}
        />
      </View>
      <ProblemLine text={problem} />
      <Button title="Make the invitation" busy={busy} onPress={onSend} />
      <Txt kind="small" tone="ink2">
        A link to hand over, good for 3 days and for one person.
      </Txt>
    </View>
  );
}
