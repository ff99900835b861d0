import { useRouter, type Href } from 'expo-router';
import { useState } from 'react';
import { sentenceOf } from '@/shared/client/api-problem';
import { useNow } from '@/shared/client/clock';
import { useFrontDoor } from '@/shared/client/front-door';
import { useNotices } from '@/shared/client/notices';
import { prefer, usePreferences } from '@/shared/client/preferences';
import { missingHere } from '@/shared/client/secure-context';
import { useCan, useMember, useSessions, useSignOut, useSignOutEverywhere } from '@/shared/client/session';
import { armSound, playSound, switchSound, useSoundState } from '@/shared/client/sound';
import { useWaitingCounts } from '@/shared/client/waiting/waiting';
import { ProblemLine } from '@/shared/ui/auth/problem-line';
import { clock } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { DeviceSettings } from '@/shared/ui/more/device-settings';
import { MoreGroup, MoreRow } from '@/shared/ui/more/more-row';
import { SessionsSheet } from '@/shared/ui/more/sessions-sheet';
import { ConfirmSheet } from '@/shared/ui/primitives/confirm-sheet';
import { Txt } from '@/shared/ui/primitives/txt';
import { Columns } from '@/shared/ui/screen/columns';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

export default function More() {
  const { person, workshop } = useMember();
  const { zone, marks } = useFormats();
  const now = useNow(60_000);
  return (
    <Screen
      header={
        <HeaderBar
          title="More"
          sub={`${person.name.split(' ')[0]} · ${workshop.name}`}
          clock={clock(now, zone, marks)}
        />
      }
    >
      <Columns
        work={
          <>
            <Places />
            <Me />
          </>
        }
        side={<Device />}
      />
    </Screen>
  );
}

function Places() {
  const router = useRouter();
  const go = (href: string) => () => router.navigate(href as Href);
  const plansBench = useCan('bench:plan');
  const seesWaits = useCan('waits:read');
  const approves = useCan('wall:approve');
  return (
    <MoreGroup title="Workshop">
      <MoreRow
        icon="day"
        title="My day"
        meaning="Your hands, look-ins and fills in their order"
        href="/my-day"
        onPress={go('/my-day')}
      />
      <MoreRow icon="work" title="Other work" meaning="Pieces that fill a wait" href="/work" onPress={go('/work')} />
      {plansBench ? (
        <MoreRow
          icon="plan"
          title="Bench plan"
          meaning="Channels and people on one time line"
          href="/bench-plan"
          onPress={go('/bench-plan')}
        />
      ) : null}
      <MoreRow
        icon="workshop"
        title="Workshop"
        meaning="People, chargers, module types, meters, walls"
        href="/workshop"
        onPress={go('/workshop')}
      />
      {seesWaits ? (
        <MoreRow icon="waits" title="Waits" meaning="Where the hours go" href="/waits" onPress={go('/waits')} />
      ) : null}
      {approves ? (
        <MoreRow
          icon="board"
          title="Approve a wall"
          meaning="Let a screen show the board"
          href="/approve"
          onPress={go('/approve')}
        />
      ) : null}
      <MoreRow
        icon="time"
        title="Quick estimate"
        meaning="Six numbers, nothing stored"
        href="/estimate"
        onPress={go('/estimate')}
      />
    </MoreGroup>
  );
}

const roleWords = { technician: 'Technician', foreman: 'Foreman', manager: 'Manager' } as const;

function Me() {
  const router = useRouter();
  const { person } = useMember();
  const readsLetter = useCan('workshop:write');
  const now = useNow(60_000);
  const counts = useWaitingCounts();
  const waiting = counts.waiting + counts.refused;
  const frontDoor = useFrontDoor().data;
  const version = frontDoor?.version;
  const [open, setOpen] = useState<'sessions' | 'sign-out' | null>(null);
  const sessions = useSessions(open === 'sessions');
  const signOut = useSignOut();
  const everywhere = useSignOutEverywhere();
  const close = () => setOpen(null);
  const failed = signOut.error ?? everywhere.error;
  return (
    <MoreGroup title="You">
      <MoreRow
        icon="person"
        title={person.name}
        meaning={`${roleWords[person.role]} · name and password`}
        href="/me"
        onPress={() => router.navigate('/me' as Href)}
      />
      <MoreRow
        icon="alerts"
        title="Alerts and where they go"
        meaning="Sound, push, e-mail and quiet hours"
        href="/me/alerts"
        onPress={() => router.navigate('/me/alerts' as Href)}
      />
      {frontDoor?.demo ? (
        <MoreRow
          icon="alerts"
          title="Mailbox of the demo"
          meaning="Letters and pushes that it has sent"
          href="/demo/mailbox"
          onPress={() => router.navigate('/demo/mailbox' as Href)}
        />
      ) : null}
      {readsLetter ? (
        <MoreRow
          icon="waits"
          title="Weekly letter"
          meaning="The waits of each week, by e-mail"
          href="/me/weekly-digest"
          onPress={() => router.navigate('/me/weekly-digest' as Href)}
        />
      ) : null}
      <MoreRow title="Signed in on" meaning="Devices, and sign out everywhere" onPress={() => setOpen('sessions')} />
      {waiting > 0 ? (
        <MoreRow
          title="Waiting on this device"
          value={String(waiting)}
          meaning="Logged without a connection, not sent yet"
          href="/waiting"
          onPress={() => router.navigate('/waiting' as Href)}
        />
      ) : null}
      <MoreRow
        title="Sign out"
        meaning={person.email}
        onPress={() => (waiting > 0 ? setOpen('sign-out') : signOut.mutate())}
      />
      <ProblemLine text={failed ? sentenceOf(failed) : null} />
      {version ? (
        <Txt kind="small" tone="ink2" style={{ paddingTop: 12 }}>
          {`Bidewell ${version}`}
        </Txt>
      ) : null}
      <SessionsSheet
        open={open === 'sessions'}
        sessions={sessions.data}
        failed={sessions.error ? sentenceOf(sessions.error) : null}
        now={now}
        busy={everywhere.isPending}
        onEverywhere={() => everywhere.mutate()}
        onClose={close}
      />
      <ConfirmSheet
        open={open === 'sign-out'}
        title="Entries wait on this device"
        fact={`${waiting === 1 ? 'One entry is' : `${waiting} entries are`} not sent yet. They stay here and are sent when you sign in on this device again.`}
        confirm="Sign out anyway"
        safe="Stay signed in"
        busy={signOut.isPending}
        onConfirm={() => signOut.mutate()}
        onClose={close}
      />
    </MoreGroup>
  );
}

function Device() {
  const { theme } = usePreferences();
  const sound = useSoundState();
  const { permission, ask, test } = useNotices();
  const [tested, setTested] = useState<'shown' | 'not-shown' | null>(null);
  const missing = missingHere(['notifications', 'camera', 'service-worker', 'wake-lock']).map(
    ({ sentence }) => sentence,
  );
  return (
    <DeviceSettings
      theme={theme}
      onTheme={(next) => prefer({ theme: next })}
      sound={sound}
      onSound={switchSound}
      onTrySound={() => void armSound().then(() => playSound('ready'))}
      notices={permission}
      onAllowNotices={() => void ask()}
      onTestNotice={() => void test().then((shown) => setTested(shown ? 'shown' : 'not-shown'))}
      tested={tested}
      missing={missing}
    />
  );
}
