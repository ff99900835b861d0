import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { useState } from 'react';
import { isProblem, sentenceOf } from '@/shared/client/api-problem';
import { useContractForm, useFormField } from '@/shared/client/forms';
import { tokenIn } from '@/shared/client/one-use-token';
import { useJoin, useLink, useResetPassword } from '@/shared/client/session';
import { joinSchema, resetSchema, type LinkDto } from '@/shared/contract/session';
import { FormStack } from '@/shared/ui/auth/form-stack';
import { PasswordField } from '@/shared/ui/auth/password-field';
import { ProblemLine } from '@/shared/ui/auth/problem-line';
import { Button } from '@/shared/ui/primitives/button';
import { FactList } from '@/shared/ui/primitives/fact-list';
import { Field } from '@/shared/ui/primitives/field';
import { Txt } from '@/shared/ui/primitives/txt';
import { Foot } from '@/shared/ui/screen/foot';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Loading } from '@/shared/ui/states/loading';
import { moment } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { useNow } from '@/shared/client/clock';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** One-use links: joining by an invitation, and a new password. */
export default function Join() {
  const { token = '', forgotten } = useLocalSearchParams<{ token?: string; forgotten?: string }>();
  return token === '' ? <Paste forgotten={forgotten === '1'} /> : <Opened token={token} />;
}

function useBack() {
  const router = useRouter();
  return () => (router.canGoBack() ? router.back() : router.replace('/' as Href));
}

function Paste({ forgotten }: { forgotten: boolean }) {
  const router = useRouter();
  const [text, setText] = useState('');
  const [error, setError] = useState<string>();
  const open = () => {
    const token = tokenIn(text);
    if (token === '') setError(text.trim() === '' ? 'Paste the link first.' : 'No link of Bidewell is in this.');
    else router.setParams({ token });
  };
  return (
    <Screen
      single
      header={<HeaderBar title={forgotten ? 'Forgotten password' : 'Join a workshop'} onBack={useBack()} />}
      foot={
        <Foot>
          <Button title="Open the link" onPress={open} />
        </Foot>
      }
    >
      <FormStack>
        <Txt>
          {forgotten
            ? 'A manager of your workshop makes you a link for a new password: Workshop, People, your name. Open it on this device, or paste it here.'
            : 'A manager of the workshop makes you a link: Workshop, People, Invite. Open it on this device, or paste it here. It works once, for three days.'}
        </Txt>
        <Field
          label="Link"
          kind="label"
          value={text}
          onChangeText={(next) => {
            setText(next);
            setError(undefined);
          }}
          error={error}
          onSubmit={open}
        />
      </FormStack>
    </Screen>
  );
}

function Opened({ token }: { token: string }) {
  const link = useLink(token);
  const back = useBack();
  const [now, { zone, marks }] = [useNow(60_000), useFormats()];
  if (!link.data) {
    const gone = isProblem(link.error) && link.error.status < 500;
    return (
      <Screen single header={<HeaderBar title="Join a workshop" onBack={back} />}>
        {link.isError ? (
          <ErrorState
            failed={gone ? 'This link does not work any more.' : sentenceOf(link.error)}
            toDo={gone ? 'It works once and for three days. Ask a manager of your workshop for a new one.' : undefined}
            action={
              gone ? undefined : { title: 'Try again', onPress: () => void link.refetch(), busy: link.isFetching }
            }
          />
        ) : (
          <Loading what="the link" onRetry={() => void link.refetch()} />
        )}
      </Screen>
    );
  }
  const until = moment(Date.parse(link.data.expiresAt), zone, now, marks);
  return link.data.kind === 'join' ? (
    <JoinForm token={token} link={link.data} until={until} />
  ) : (
    <ResetForm token={token} link={link.data} until={until} />
  );
}

interface FormProps {
  token: string;
  link: LinkDto;
  /** When the link lapses. */
  until: string;
}

const roleWords = { technician: 'Technician', foreman: 'Foreman', manager: 'Manager' } as const;

function JoinForm({ token, link, until }: FormProps) {
  const router = useRouter();
  const join = useJoin();
  const f = useContractForm({
    schema: joinSchema,
    initial: { token, name: '', password: '' },
    draft: 'join',
    secret: ['password', 'token'],
    send: async (output) => {
      await join.mutateAsync(output);
      router.replace('/' as Href);
    },
  });
  const [name, password] = [useFormField(f, 'name'), useFormField(f, 'password')];
  return (
    <Screen
      single
      header={<HeaderBar title={`Join ${link.workshopName}`} onBack={useBack()} />}
      foot={
        <Foot>
          <Button title="Join the workshop" busy={f.busy} onPress={() => void f.submit()} />
        </Foot>
      }
    >
      <FormStack>
        <FactList
          facts={[
            { name: 'E-mail', value: link.email },
            { name: 'Role', value: roleWords[link.role] },
            { name: 'The link works', value: `once, until ${until}` },
          ]}
        />
        <Field label="Your name" required autoComplete="name" nextKey="next" {...name} />
        <PasswordField label="Password" fresh hint="12 characters at least; 15 or more is better." {...password} />
        <ProblemLine text={f.problem} />
      </FormStack>
    </Screen>
  );
}

function ResetForm({ token, link, until }: FormProps) {
  const router = useRouter();
  const reset = useResetPassword();
  const f = useContractForm({
    schema: resetSchema,
    initial: { token, password: '' },
    send: async (output) => {
      await reset.mutateAsync(output);
      router.replace('/' as Href);
    },
  });
  const password = useFormField(f, 'password');
  return (
    <Screen
      single
      header={<HeaderBar title="New password" sub={link.workshopName} onBack={useBack()} />}
      foot={
        <Foot note="Every other device is signed out by this.">
          <Button title="Set the password" busy={f.busy} onPress={() => void f.submit()} />
        </Foot>
      }
    >
      <FormStack>
        <FactList
          facts={[
            { name: 'E-mail', value: link.email },
            { name: 'The link works', value: `once, until ${until}` },
          ]}
        />
        <PasswordField label="New password" fresh hint="12 characters at least; 15 or more is better." {...password} />
        <ProblemLine text={f.problem} />
      </FormStack>
    </Screen>
  );
}
