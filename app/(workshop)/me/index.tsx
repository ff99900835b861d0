import { useRouter, type Href } from 'expo-router';
import { useContractForm, useFormField } from '@/shared/client/forms';
import { useChangeMe, useMember } from '@/shared/client/session';
import { changeMeSchema } from '@/shared/contract/session';
import { FormStack } from '@/shared/ui/auth/form-stack';
import { PasswordField } from '@/shared/ui/auth/password-field';
import { ProblemLine } from '@/shared/ui/auth/problem-line';
import { Button } from '@/shared/ui/primitives/button';
import { Field } from '@/shared/ui/primitives/field';
import { Rule } from '@/shared/ui/primitives/rule';
import { useToast } from '@/shared/ui/primitives/toast';
import { Txt } from '@/shared/ui/primitives/txt';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** One's own name and password. */
export default function Me() {
  const router = useRouter();
  const { person } = useMember();
  const back = () => (router.canGoBack() ? router.back() : router.replace('/more' as Href));
  return (
    <Screen single header={<HeaderBar title="Name and password" sub={person.email} onBack={back} />}>
      <NameForm name={person.name} />
      <Rule gap={24} />
      <PasswordForm />
    </Screen>
  );
}

function NameForm({ name }: { name: string }) {
  const change = useChangeMe();
  const toast = useToast();
  const f = useContractForm({
    schema: changeMeSchema,
    initial: { name },
    draft: 'me',
    send: async (output) => {
      await change.mutateAsync({ name: output.name });
      toast({ text: 'Your name is changed.' });
    },
  });
  return (
    <FormStack>
      <Field label="Your name" required autoComplete="name" {...useFormField(f, 'name')} />
      <ProblemLine text={f.problem} />
      <Button title="Change the name" look="line" busy={f.busy} onPress={() => void f.submit()} />
    </FormStack>
  );
}

function PasswordForm() {
  const change = useChangeMe();
  const toast = useToast();
  const f = useContractForm({
    schema: changeMeSchema,
    initial: { currentPassword: '', password: '' },
    send: async (output) => {
      await change.mutateAsync(output);
      f.clear();
      toast({ text: 'Your password is changed. Other devices are signed out.' });
    },
  });
  return (
    <FormStack>
      <PasswordField label="Present password" {...useFormField(f, 'currentPassword')} />
      <PasswordField
        label="New password"
        fresh
        hint="12 characters at least; 15 or more is better."
        {...useFormField(f, 'password')}
      />
      <Txt kind="small" tone="ink2">
        Every other device is signed out by this.
      </Txt>
      <ProblemLine text={f.problem} />
      <Button title="Change the password" look="line" busy={f.busy} onPress={() => void f.submit()} />
    </FormStack>
  );
}
