import { lazy, Suspense } from 'react';
import { View } from 'react-native';
import type { ChargeDto } from '@/shared/contract/charge';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { Link } from '../primitives/link';
import { Rule } from '../primitives/rule';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { useBreakpoint } from '../theme/use-breakpoint';
import { WaitingHere } from '../waiting/waiting-here';
import { isUnderWay } from './card-model';
import { CardRibbon } from './card-ribbon';
import { ReadingLog } from './charge-log';
import { Emergency } from './emergency';
import { HandCallOut } from './hand-call-out';
import { liveNoteId } from './live-acts';
import { LiveFacts } from './live-facts';
import { LiveHead, StageLine } from './live-head';
import { LearnedPanel } from './learned-panel';
import { ClipOnLine, CurrentLine, LookInLine } from './live-lines';
import { isProven, type LiveScreenProps } from './live-props';
import { OfflineCaution } from './offline-caution';
import { OddSeenCallOut } from './odd-seen-call-out';
import { ReadyFacts } from './ready-panel';
import { RestLine } from './rest-line';
import { lastReading, SeenAndPlan } from './seen-and-plan';
import { TopUpCallOut } from './top-up-call-out';

const DriftLine = lazy(() => import('./drift-line').then((module) => ({ default: module.DriftLine })));

/** The middle of the live screen: the number and its ribbon, what asks for somebody, what was seen. */
export function LiveWork(props: LiveScreenProps) {
  const styles = useStyles();
  const { charge, at, knownAt } = props;
  const wide = useBreakpoint() === 'wide';
  const proven = isProven(charge);
  return (
    <View style={styles.stack}>
      {proven ? (
        <StageLine charge={charge} now={at.now} knownAt={knownAt} />
      ) : (
        <LiveHead charge={charge} at={at} knownAt={knownAt} />
      )}
      {proven && !wide ? (
        <>
          <LiveFacts {...props} />
          <Rule gap={4} />
        </>
      ) : null}
      {proven ? <ReadyFacts charge={charge} now={at.now} /> : null}
      <CardRibbon card={charge} at={at} height={proven ? 56 : 76} stale={knownAt !== null} />
      <Drift {...props} />
      <WhileOffline {...props} />
      {charge.odd ? <OddSeenCallOut odd={charge.odd} charge={charge} now={at.now} /> : null}
      {props.channels}
      <Asks {...props} />
      <Outcome {...props} />
      {isOver(charge) ? null : <Emergency charge={charge} chemistry={props.type?.chemistry ?? null} />}
      {wide || proven ? null : (
        <>
          <Rule gap={4} />
          <LiveFacts {...props} />
        </>
      )}
      {isUnderWay(charge) ? <SeenAndPlan charge={charge} now={at.now} /> : null}
      <LearnedPanel learned={charge.learned} />
      {wide ? (
        <View style={styles.log}>
          <LiveReadings {...props} />
        </View>
      ) : null}
    </View>
  );
}

/** The module is in the pack or on the shelf. A stopped one still lies on the bench. */
const isOver = ({ stage }: ChargeDto): boolean => stage === 'fitted' || stage === 'shelved';

/** All readings, with the way to put one right, and to a file of them. */
export const LiveReadings = ({ charge, at, meters, onGo }: LiveScreenProps) => (
  <>
    <ReadingLog
      charge={charge}
      now={at.now}
      meters={meters}
      onCorrect={(reading) => onGo(`/charges/${charge.id}/log?correct=${reading.id}`)}
    />
    {isUnderWay(charge) ? (
      <Link title="Add a logger’s file" onPress={() => onGo(`/charges/${charge.id}/log-file`)} />
    ) : null}
  </>
);

/** By when a ready module is to be fitted. */
function Drift({ charge, type, at }: LiveScreenProps) {
  if (charge.stage !== 'ready' || !type) return null;
  return (
    <Suspense fallback={null}>
      <Rule gap={4} />
      <DriftLine charge={charge} type={type} now={at.now} />
    </Suspense>
  );
}

/** What the figures are from while the link is down, what waits on this device, and what does not reach it. */
function WhileOffline({ charge, at, knownAt, waiting, waitingActs }: LiveScreenProps) {
  const { zone, marks } = useFormats();
  const device = useBreakpoint() === 'phone' ? 'phone' : 'device';
  const readings = waiting.filter(({ kind }) => kind === 'reading').length;
  const from = charge.lastReadingAt
    ? `From the reading at ${moment(Date.parse(charge.lastReadingAt), zone, at.now, marks)}.`
    : 'From the plan.';
  const below =
    readings === 0
      ? ''
      : readings === 1
        ? ' The reading below is not in it yet.'
        : ` The ${readings} readings below are not in it yet.`;
  return (
    <>
      {knownAt === null ? null : (
        <Txt kind="small" tone="ink2">
          {`${from} The clock goes on here.${below}`}
        </Txt>
      )}
      <WaitingHere items={waiting} last={lastReading(charge)} now={at.now} device={device} {...waitingActs} />
      {knownAt !== null && isUnderWay(charge) ? <OfflineCaution charge={charge} now={at.now} device={device} /> : null}
    </>
  );
}

/** As on the server: a visit so long before a look-in counts for it, ms. */
const lookInWindowMs = 10 * 60_000;

/** What asks for somebody: a top-up, a hand, a look-in, a time. */
function Asks({ charge, at, knownAt, waiting, acts, topUp, onSheet }: LiveScreenProps) {
  const offline = knownAt !== null;
  // A visit that waits here, for the look-in that is asked for: it counts from ten minutes before.
  const due = charge.nextLookInAt === null ? Infinity : Date.parse(charge.nextLookInAt) - lookInWindowMs;
  const lookedIn = waiting.some(
    ({ kind, refused, input }) => kind === 'look-in' && refused === null && Date.parse(input.at) >= due,
  );
  const lines = {
    charge,
    now: at.now,
    busy: acts.busy,
    disabled: offline,
    describedBy: offline ? liveNoteId : undefined,
  };
  return (
    <>
      {topUp ? (
        <TopUpCallOut
          groups={charge.restChecks.at(-1)?.verdict.groups ?? []}
          topUp={topUp.option}
          ruledOut={topUp.ruledOut}
        />
      ) : null}
      <HandCallOut
        {...lines}
        onSwapped={acts.nextStep}
        onOff={() => acts.currentOff()}
        onOffEarlier={() => onSheet('off-since')}
      />
      {lookedIn ? null : <LookInLine {...lines} disabled={false} describedBy={undefined} onDone={acts.lookIn} />}
      <CurrentLine {...lines} onOffAt={() => onSheet('off-since')} />
      <RestLine charge={charge} now={at.now} />
      <ClipOnLine {...lines} onChange={() => onSheet('clip-on')} />
    </>
  );
}

/** Where a charge that is over has gone, and what it went on from. */
function Outcome({ charge, at, onGo }: LiveScreenProps) {
  const { zone, marks } = useFormats();
  const stopped = charge.stage === 'stopped' && charge.stoppedAt ? Date.parse(charge.stoppedAt) : null;
  return (
    <>
      {stopped === null ? null : (
        <Txt>{`Stopped ${moment(stopped, zone, at.now, marks)}: ${charge.stopReason ?? 'no reason kept'}.`}</Txt>
      )}
      {charge.wentOnAs ? (
        <Link
          title={`It went on as ${charge.wentOnAs.number}`}
          onPress={() => onGo(`/charges/${charge.wentOnAs?.id}`)}
        />
      ) : null}
      {charge.topUpOf ? (
        <Link title={`A top-up of ${charge.topUpOf.number}`} onPress={() => onGo(`/charges/${charge.topUpOf?.id}`)} />
      ) : null}
    </>
  );
}

const useStyles = makeStyles(() => ({ stack: { rowGap: 8 }, log: { marginTop: 16 } }));
