import { useRouter, type Href } from 'expo-router';
import { useRef, useState } from 'react';
import type { Role } from '@/shared/contract/roles';
import { isProblem, sentenceOf } from '@/shared/client/api-problem';
import { useStore } from '@/shared/client/external-store';
import { useFrontDoor } from '@/shared/client/front-door';
import { useDemoSignIn, useSignIn } from '@/shared/client/session';
import { endedStore, endedSentence, lastEmail } from '@/shared/client/session-state';
import { AuthPage } from '@/shared/ui/auth/auth-page';
import { SignInForm, type SignInErrors } from '@/shared/ui/auth/sign-in-form';
import type { FieldHandle } from '@/shared/ui/primitives/field';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

export default function SignIn() {
  const router = useRouter();
  const frontDoor = useFrontDoor();
  const ended = useStore(endedStore);
  const signIn = useSignIn();
  const demo = useDemoSignIn();
  const [email, setEmail] = useState(lastEmail.get);
  const [password, setPassword] = useState('');
  const [errors, setErrors] = useState<SignInErrors>({});
  const emailRef = useRef<FieldHandle>(null);
  const passwordRef = useRef<FieldHandle>(null);

  const refuse = (found: SignInErrors) => {
    setErrors(found);
    (found.email ? emailRef : passwordRef).current?.focus();
  };
  const failed = (error: unknown) => {
    const named = isProblem(error) ? error.fields : {};
    refuse({
      email: named.email,
      password: named.password,
      problem: named.email || named.password ? undefined : sentenceOf(error),
    });
  };
  const send = () => {
    const missing: SignInErrors = {
      email: email.trim() === '' ? 'Type your e-mail.' : undefined,
      password: password === '' ? 'Type your password.' : undefined,
    };
    if (missing.email || missing.password) return refuse(missing);
    setErrors({});
    lastEmail.set(email.trim());
    signIn.mutate({ email, password }, { onError: failed });
  };
  const enter = (role: Role) => {
    setErrors({});
    demo.mutate(role, { onError: (error) => setErrors({ problem: sentenceOf(error) }) });
  };

  return (
    <AuthPage low={Boolean(ended ?? frontDoor.data?.demo)}>
      <SignInForm
        notice={ended ? endedSentence(ended) : null}
        email={email}
        password={password}
        errors={errors}
        emailRef={emailRef}
        passwordRef={passwordRef}
        busy={signIn.isPending}
        onEmail={setEmail}
        onPassword={setPassword}
        onSend={send}
        demo={
          frontDoor.data?.demo
            ? {
                workshop: frontDoor.data.workshopName,
                busy: demo.isPending ? (demo.variables ?? null) : null,
                onEnter: enter,
              }
            : null
        }
        empty={frontDoor.data?.empty ?? false}
        onGo={(path) => router.push(path as Href)}
      />
    </AuthPage>
  );
}
