import type { RefObject } from 'react';
import { StyleSheet, View } from 'react-native';
import type { Role } from '@/shared/contract/roles';
import { Button } from '../primitives/button';
import { CallOut } from '../primitives/call-out';
import { Field, type FieldHandle } from '../primitives/field';
import { Link } from '../primitives/link';
import { Rule } from '../primitives/rule';
import { Txt } from '../primitives/txt';
import { DemoDoors } from './demo-doors';
import { PasswordField } from './password-field';
import { ProblemLine } from './problem-line';

export interface SignInErrors {
  email?: string;
  password?: string;
  /** No single field is to blame. */
  problem?: string;
}

export interface SignInFormProps {
  /** Why one has to sign in again. */
  notice: string | null;
  email: string;
  password: string;
  errors: SignInErrors;
  emailRef: RefObject<FieldHandle | null>;
  passwordRef: RefObject<FieldHandle | null>;
  busy: boolean;
  onEmail: (text: string) => void;
  onPassword: (text: string) => void;
  onSend: () => void;
  demo: { workshop: string | null; busy: Role | null; onEnter: (role: Role) => void } | null;
  /** No workshop lives here yet. */
  empty: boolean;
  onGo: (path: '/estimate' | '/create' | '/join' | '/join?forgotten=1') => void;
}

/** E-mail and password, the ways around them, and the estimate that needs neither. */
export function SignInForm(props: SignInFormProps) {
  const { notice, demo, empty, onGo } = props;
  return (
    <>
      {notice ? (
        <CallOut tone="amber">
          <Txt>{notice}</Txt>
        </CallOut>
      ) : null}
      {empty ? <FirstDoor onCreate={() => onGo('/create')} problem={props.errors.problem} /> : <Entry {...props} />}
      <Rule gap={0} />
      {demo ? (
        <>
          <DemoDoors {...demo} />
          <Rule gap={0} />
        </>
      ) : null}
      <Button title="Quick estimate, no sign-in" look="line" onPress={() => onGo('/estimate')} />
      {empty ? null : <Link title="Create a workshop" href="/create" onPress={() => onGo('/create')} />}
    </>
  );
}

function FirstDoor({ onCreate, problem }: { onCreate: () => void; problem?: string }) {
  return (
    <>
      <Txt>No workshop lives here yet. Whoever creates the first becomes its manager.</Txt>
      <ProblemLine text={problem} />
      <Button title="Create a workshop" onPress={onCreate} />
    </>
  );
}

function Entry({
  email,
  password,
  errors,
  emailRef,
  passwordRef,
  busy,
  onEmail,
  onPassword,
  onSend,
  onGo,
}: SignInFormProps) {
  return (
    <>
      <Field
        ref={emailRef}
        label="E-mail"
        kind="email"
        autoComplete="username"
        required
        value={email}
        onChangeText={onEmail}
        error={errors.email}
        nextKey="next"
        onSubmit={() => passwordRef.current?.focus()}
      />
      <PasswordField
        ref={passwordRef}
        label="Password"
        value={password}
        onChangeText={onPassword}
        error={errors.password}
        nextKey="send"
        onSubmit={onSend}
      />
      <ProblemLine text={errors.problem} />
      <Button title="Sign in" busy={busy} onPress={onSend} style={styles.send} />
      <View style={styles.ways}>
        <Link title="Forgotten password" href="/join?forgotten=1" onPress={() => onGo('/join?forgotten=1')} />
        <Link title="Join with a link" href="/join" onPress={() => onGo('/join')} />
      </View>
    </>
  );
}

const styles = StyleSheet.create({
  send: { marginTop: 4 },
  ways: { flexDirection: 'row', justifyContent: 'space-between', marginVertical: -6 },
});
