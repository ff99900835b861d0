import { useRouter, type Href } from 'expo-router';
import { useEffect, useState } from 'react';
import { isOpen, useAlerts, usePassAlert, useTakeAlert } from '@/shared/client/alerts';
import { sentenceOf } from '@/shared/client/api-problem';
import { useBoard } from '@/shared/client/board';
import { useNow } from '@/shared/client/clock';
import { useLink } from '@/shared/client/link';
import { noticePermission } from '@/shared/client/notify';
import { usePeople } from '@/shared/client/people';
import { useMember } from '@/shared/client/session';
import { armSound, switchSound, useSoundState } from '@/shared/client/sound';
import { useWorkshop } from '@/shared/client/workshop';
import type { AlertDto } from '@/shared/contract/alert';
import { UndeliveredPart } from '@/shared/screens/alerts/undelivered-part';
import { AlertLists } from '@/shared/ui/alerts/alert-lists';
import { SoundTool, soundWords } from '@/shared/ui/alerts/sound-tool';
import { HandOverSheet } from '@/shared/ui/charge/hand-over-sheet';
import { clock } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { Link } from '@/shared/ui/primitives/link';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Loading } from '@/shared/ui/states/loading';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** What asks for somebody: who has it, what was seen, what to check first. */
export default function Alerts() {
  const router = useRouter();
  const { person } = useMember();
  const { zone, marks } = useFormats();
  const now = useNow(1000);
  const alerts = useAlerts();
  const board = useBoard().data;
  const settings = useWorkshop().data;
  const people = usePeople().data;
  const sound = useSoundState();
  const offline = useLink().state === 'down';
  const take = useTakeAlert();
  const pass = usePassAlert();
  const [passing, setPassing] = useState<AlertDto | null>(null);
  const [refused, setRefused] = useState<{ id: string; text: string } | null>(null);
  const go = (path: string) => router.push(path as Href);
  const onError = (id: string) => (error: unknown) => {
    setRefused({ id, text: sentenceOf(error) });
    // Somebody else was first: show who.
    void alerts.refetch();
  };
  const open = (alerts.data ?? []).filter(isOpen).length;
  const notices = useNoticesOn() ? 'notices on' : 'no notices';
  return (
    <Screen
      header={
        <HeaderBar
          title="Alerts"
          sub={`${open} open · ${soundWords[sound]}, ${notices}`}
          clock={clock(now, zone, marks)}
          tools={<SoundTool state={sound} onArm={() => void armSound()} onSwitch={switchSound} />}
        />
      }
    >
      {alerts.data ? (
        <AlertLists
          alerts={alerts.data}
          now={now}
          onGo={go}
          above={<UndeliveredPart now={now} offline={offline} />}
          below={<Link title="Where your alerts go" href="/me/alerts" onPress={() => go('/me/alerts')} />}
          cardOf={(alert) => ({
            card: board?.charges.find((charge) => charge.id === alert.chargeId),
            personId: person.id,
            lagLimitVolts: settings === undefined ? undefined : settings.lagLimitMillivolts / 1000,
            busy: take.isPending && take.variables.id === alert.id,
            offline,
            problem: refused?.id === alert.id ? refused.text : null,
            onTake: () => {
              setRefused(null);
              take.mutate({ id: alert.id }, { onError: onError(alert.id) });
            },
            onPass: () => {
              setRefused(null);
              setPassing(alert);
            },
          })}
        />
      ) : alerts.isError ? (
        <ErrorState
          failed="The alerts could not be read."
          safe="They are kept on the server."
          toDo={sentenceOf(alerts.error)}
          action={{ title: 'Try again', onPress: () => void alerts.refetch(), busy: alerts.isFetching }}
        />
      ) : (
        <Loading what="the alerts" onRetry={() => void alerts.refetch()} />
      )}
      <HandOverSheet
        key={passing?.id}
        open={passing !== null}
        title={passing ? `Pass ${passing.title} on` : ''}
        confirm="Pass it"
        people={people}
        presentId={person.id}
        busy={pass.isPending}
        problem={refused && refused.id === passing?.id ? refused.text : null}
        onClose={() => setPassing(null)}
        onChoose={(personId) => {
          if (!passing) return;
          setRefused(null);
          pass.mutate(
            { id: passing.id, personId },
            { onSuccess: () => setPassing(null), onError: onError(passing.id) },
          );
        }}
      />
    </Screen>
  );
}

/** The browser lets this device show notices. */
function useNoticesOn(): boolean {
  const [on, setOn] = useState(false);
  useEffect(() => {
    let over = false;
    void noticePermission().then((permission) => {
      if (!over) setOn(permission === 'granted');
    });
    return () => {
      over = true;
    };
  }, []);
  return on;
}
