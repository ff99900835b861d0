import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { lazy, Suspense, useState } from 'react';
import { View } from 'react-native';
import { isConflict, isProblem, sentenceOf } from '@/shared/client/api-problem';
import {
  useCharge,
  useCurrentOff,
  useDropCharge,
  useFitCharge,
  useHandOver,
  useHoldCharge,
  useLookIn,
  useNextStep,
  useResumeCharge,
  useShelveCharge,
  useStopCharge,
} from '@/shared/client/charges';
import { useNow } from '@/shared/client/clock';
import { useLink } from '@/shared/client/link';
import { usePeople } from '@/shared/client/people';
import type { ChargeDto } from '@/shared/contract/charge';
import { CardRibbon } from '@/shared/ui/charge/card-ribbon';
import { EventLog, ReadingLog } from '@/shared/ui/charge/charge-log';
import { Emergency } from '@/shared/ui/charge/emergency';
import { HandOverSheet } from '@/shared/ui/charge/hand-over-sheet';
import { LiveFoot, type LiveAct } from '@/shared/ui/charge/live-foot';
import { LiveHead } from '@/shared/ui/charge/live-head';
import { LiveLevels } from '@/shared/ui/charge/live-levels';
import { CurrentOff, HandCallOut, LookInLine, WhoHasIt } from '@/shared/ui/charge/live-side';
import { SeenAndPlan } from '@/shared/ui/charge/seen-and-plan';
import { StopSheet } from '@/shared/ui/charge/stop-sheet';
import { clock } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { StandingLine } from '@/shared/ui/primitives/call-out';
import { ConfirmSheet } from '@/shared/ui/primitives/confirm-sheet';
import { Field } from '@/shared/ui/primitives/field';
import { Link } from '@/shared/ui/primitives/link';
import { Rule } from '@/shared/ui/primitives/rule';
import { Txt } from '@/shared/ui/primitives/txt';
import { Columns } from '@/shared/ui/screen/columns';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Loading } from '@/shared/ui/states/loading';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

const LivePicture = lazy(() => import('@/shared/ui/charge/live-picture'));

/** One charge, live. */
export default function Charge() {
  const { id } = useLocalSearchParams<{ id: string }>();
  const router = useRouter();
  const query = useCharge(id);
  const { zone, marks } = useFormats();
  const now = useNow(1000);
  const back = () => (router.canGoBack() ? router.back() : router.replace('/bench' as Href));
  if (query.data) return <Live charge={query.data} now={now} onBack={back} />;
  const gone = isProblem(query.error) && query.error.status === 404;
  return (
    <Screen header={<HeaderBar title="Charge" onBack={back} clock={clock(now, zone, marks)} />}>
      {query.isError ? (
        <ErrorState
          failed={gone ? 'This charge is not here.' : 'The charge could not be read.'}
          safe={gone ? undefined : 'It goes on as it was set.'}
          toDo={gone ? 'It may have been dropped.' : sentenceOf(query.error)}
          action={
            gone
              ? { title: 'Back to the bench', onPress: back }
              : { title: 'Try again', onPress: () => void query.refetch() }
          }
        />
      ) : (
        <Loading what="the charge" onRetry={() => void query.refetch()} />
      )}
    </Screen>
  );
}

type Sheet = 'stop' | 'hold' | 'hand-over' | 'fit' | 'shelve' | 'drop';

function Live({ charge, now, onBack }: { charge: ChargeDto; now: number; onBack: () => void }) {
  const router = useRouter();
  const { zone, marks } = useFormats();
  const down = useLink().state === 'down';
  const [sheet, setSheet] = useState<Sheet | null>(null);
  const acts = useActs(charge, () => setSheet(null));
  const people = usePeople().data;
  const go = (path: string) => router.push(path as Href);
  const act = (kind: LiveAct) => {
    acts.forget();
    if (kind === 'log' || kind === 'checks' || kind === 'check' || kind === 'label')
      go(`/charges/${charge.id}/${kind}`);
    else if (kind === 'resume') acts.resume();
    else setSheet(kind);
  };
  const channel = charge.channelNames.length > 0 ? ` · channel ${charge.channelNames.join(', ')}` : '';
  return (
    <Screen
      header={
        <HeaderBar
          title={charge.title}
          sub={`${charge.spare.label} · ${charge.typeName}${channel}`}
          onBack={onBack}
          clock={clock(now, zone, marks)}
        />
      }
      foot={
        <LiveFoot charge={charge} offline={down} busy={acts.busy} problem={sheet ? null : acts.problem} onAct={act} />
      }
    >
      <Columns
        work={
          <View style={{ rowGap: 8 }}>
            <LiveHead charge={charge} now={now} old={down} />
            <CardRibbon card={charge} now={now} height={64} stale={down} />
            <LookInLine charge={charge} now={now} busy={acts.busy} disabled={down} onDone={acts.lookIn} />
            <HandCallOut charge={charge} busy={acts.busy} disabled={down} onDone={acts.nextStep} />
            <CurrentOff charge={charge} now={now} busy={acts.busy} disabled={down} onOff={acts.currentOff} />
            <Outcome charge={charge} onOpen={go} />
            <Rule gap={8} />
            <LiveLevels charge={charge} />
            <SeenAndPlan charge={charge} now={now} />
            <Emergency />
          </View>
        }
        side={
          <View style={{ rowGap: 20 }}>
            <WhoHasIt charge={charge} onHandOver={() => setSheet('hand-over')} />
            <Suspense fallback={null}>
              <LivePicture charge={charge} now={now} />
            </Suspense>
            <ReadingLog
              charge={charge}
              now={now}
              onCorrect={(reading) => go(`/charges/${charge.id}/log?correct=${reading.id}`)}
            />
            <EventLog charge={charge} now={now} />
            <StandingLine />
          </View>
        }
      />
      {sheet === 'stop' || sheet === 'hold' ? (
        <StopSheet
          kind={sheet}
          charge={charge}
          open
          busy={acts.busy}
          problem={acts.problem}
          onClose={() => setSheet(null)}
          onConfirm={(input) => (sheet === 'stop' ? acts.stop(input) : acts.hold(input.reason))}
        />
      ) : null}
      <HandOverSheet
        open={sheet === 'hand-over'}
        title={`Hand ${charge.title} over`}
        confirm="Hand over"
        people={people}
        presentId={charge.person?.id ?? null}
        busy={acts.busy}
        problem={acts.problem}
        onClose={() => setSheet(null)}
        onChoose={acts.handOver}
      />
      {sheet === 'fit' || sheet === 'shelve' || sheet === 'drop' ? (
        <EndSheet kind={sheet} charge={charge} acts={acts} onClose={() => setSheet(null)} onDropped={onBack} />
      ) : null}
    </Screen>
  );
}

/** Where a charge that is over has gone. */
function Outcome({ charge, onOpen }: { charge: ChargeDto; onOpen: (path: string) => void }) {
  const { zone, marks } = useFormats();
  if (charge.wentOnAs)
    return (
      <Link
        title={`It went on as ${charge.wentOnAs.number}`}
        onPress={() => onOpen(`/charges/${charge.wentOnAs?.id}`)}
      />
    );
  if (charge.stage === 'stopped' && charge.stoppedAt)
    return (
      <Txt>{`Stopped ${clock(Date.parse(charge.stoppedAt), zone, marks)}: ${charge.stopReason ?? 'no reason kept'}.`}</Txt>
    );
  if (charge.topUpOf)
    return (
      <Link title={`A top-up of ${charge.topUpOf.number}`} onPress={() => onOpen(`/charges/${charge.topUpOf?.id}`)} />
    );
  return null;
}

/** Every write of this screen, with one busy flag and one sentence of what went wrong. */
function useActs(charge: ChargeDto, done: () => void) {
  const [stop, hold, resume, off, next] = [
    useStopCharge(),
    useHoldCharge(),
    useResumeCharge(),
    useCurrentOff(),
    useNextStep(),
  ];
  const [lookIn, handOver, fit, shelve, drop] = [
    useLookIn(),
    useHandOver(),
    useFitCharge(),
    useShelveCharge(),
    useDropCharge(),
  ];
  const [problem, setProblem] = useState<string | null>(null);
  const all = [stop, hold, resume, off, next, lookIn, handOver, fit, shelve, drop];
  const base = { id: charge.id, rev: charge.rev };
  const outcome = {
    onSuccess: () => {
      setProblem(null);
      done();
    },
    // On a conflict the charge is read again by itself; the sentence says what happened meanwhile.
    onError: (error: unknown) =>
      setProblem(isConflict(error) ? `${sentenceOf(error)} Look at the charge again, then decide.` : sentenceOf(error)),
  };
  return {
    problem,
    forget: () => setProblem(null),
    busy: all.some((write) => write.isPending),
    stop: (input: { reason: string; quarantine: boolean }) => stop.mutate({ ...base, ...input }, outcome),
    hold: (reason: string) => hold.mutate({ ...base, reason }, outcome),
    resume: () => resume.mutate(base, outcome),
    currentOff: () => off.mutate(base, outcome),
    nextStep: () => next.mutate(base, outcome),
    lookIn: () => lookIn.mutate({ id: charge.id }, outcome),
    handOver: (personId: string) => handOver.mutate({ ...base, personId }, outcome),
    fit: (note: string | null) => fit.mutate({ ...base, note }, outcome),
    shelve: (shelfPlace: string | null) => shelve.mutate({ ...base, shelfPlace }, outcome),
    drop: (after: () => void) => drop.mutate(base, { ...outcome, onSuccess: after }),
  };
}

const endWords = {
  fit: { title: 'It is fitted', confirm: 'Yes, it is fitted', safe: 'Not yet', field: 'Note' },
  shelve: {
    title: 'Back on the shelf',
    confirm: 'Put it back on the shelf',
    safe: 'Keep it for the repair',
    field: 'Shelf place',
  },
  drop: { title: 'Drop the plan', confirm: 'Drop the plan', safe: 'Keep the plan', field: null },
} as const;

function EndSheet({
  kind,
  charge,
  acts,
  onClose,
  onDropped,
}: {
  kind: 'fit' | 'shelve' | 'drop';
  charge: ChargeDto;
  acts: ReturnType<typeof useActs>;
  onClose: () => void;
  onDropped: () => void;
}) {
  const [text, setText] = useState(kind === 'shelve' ? (charge.shelfPlace ?? '') : '');
  const words = endWords[kind];
  const confirm = () => {
    if (kind === 'fit') acts.fit(text.trim() || null);
    else if (kind === 'shelve') acts.shelve(text.trim() || null);
    else acts.drop(onDropped);
  };
  return (
    <ConfirmSheet
      open
      title={words.title}
      fact={
        kind === 'fit'
          ? `${charge.spare.label} leaves the stock and the charge is closed.`
          : kind === 'shelve'
            ? `${charge.spare.label} goes back into stock with the voltages of its check.`
            : `${charge.spare.label} and its channel are free again. Nothing was clipped on.`
      }
      confirm={words.confirm}
      safe={words.safe}
      busy={acts.busy}
      onConfirm={confirm}
      onClose={onClose}
    >
      {words.field ? (
        <Field label={words.field} value={text} onChangeText={setText} maxLength={kind === 'shelve' ? 30 : 300} />
      ) : null}
      {acts.problem ? (
        <Txt tone="alarm" bold role="alert">
          {acts.problem}
        </Txt>
      ) : null}
    </ConfirmSheet>
  );
}
