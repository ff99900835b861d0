import { lazy, Suspense } from 'react';
import { View } from 'react-native';
import type { PlanOption } from '@/calc/plan-types';
import type { ChargeDto, ReadingDto } from '@/shared/contract/charge';
import type { ModuleTypeDto } from '@/shared/contract/equipment';
import type { PersonDto } from '@/shared/contract/people';
import { clock, moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { StandingLine } from '../primitives/call-out';
import { Link } from '../primitives/link';
import { Rule } from '../primitives/rule';
import { Txt } from '../primitives/txt';
import { Columns } from '../screen/columns';
import { HeaderBar } from '../screen/header-bar';
import { Screen } from '../screen/screen';
import { makeStyles } from '../theme/make-styles';
import { useBreakpoint } from '../theme/use-breakpoint';
import { channelsOf, isUnderWay, type CardClock } from './card-model';
import { CardRibbon } from './card-ribbon';
import { EventLog, ReadingLog } from './charge-log';
import { Emergency } from './emergency';
import { HandCallOut } from './hand-call-out';
import { LiveFoot, LiveHeadActs, LiveNote, liveNoteId, type LiveAct } from './live-acts';
import { LiveHead, StageLine } from './live-head';
import { LiveLevels } from './live-levels';
import { ClipOnLine, CurrentLine, LookInLine, WhoHasIt } from './live-lines';
import { LiveSheets, type ChargeActs, type LiveSheet, type LiveSheetsProps } from './live-sheets';
import { ReadyFacts, ReadyPanel } from './ready-panel';
import { SeenAndPlan } from './seen-and-plan';
import { TopUpCallOut } from './top-up-call-out';
import { OfflineCaution, WaitingReadings, type WaitingReading } from './waiting-readings';

const LivePicture = lazy(() => import('./live-picture').then((module) => ({ default: module.LivePicture })));
const DriftLine = lazy(() => import('./drift-line').then((module) => ({ default: module.DriftLine })));

export interface LiveScreenProps {
  charge: ChargeDto;
  at: CardClock;
  /** The link is down: when the figures were told. */
  knownAt: number | null;
  lagLimitVolts: number | undefined;
  type: ModuleTypeDto | undefined;
  people: readonly PersonDto[] | undefined;
  mayHandOver: boolean;
  acts: ChargeActs;
  sheet: LiveSheet | null;
  stopDraft: LiveSheetsProps['stopDraft'];
  waiting: readonly WaitingReading[];
  /** After a check outside the tolerance: the soonest way to put it right. */
  topUp: { option: PlanOption | null; ruledOut: string | null } | null;
  onBack: () => void;
  onGo: (path: string) => void;
  onAct: (act: LiveAct) => void;
  onSheet: (sheet: LiveSheet | null) => void;
  onRemoveWaiting: (key: string) => void;
}

/** One charge from plan to pack: where it stands, what comes next, what was seen, what happened. */
export function LiveScreen(props: LiveScreenProps) {
  const { charge, at, knownAt, acts, onAct } = props;
  const { zone, marks } = useFormats();
  const wide = useBreakpoint() === 'wide';
  const channel = channelsOf(charge);
  const offline = knownAt !== null;
  const foot = { charge, offline, busy: acts.busy, onAct };
  const problem = props.sheet === null ? acts.problem : null;
  return (
    <Screen
      header={
        <HeaderBar
          title={charge.title}
          sub={[
            charge.spare.label,
            charge.typeName,
            channel && `${charge.stage === 'ready' ? 'off' : 'channel'} ${channel}`,
          ]
            .filter(Boolean)
            .join(' · ')}
          onBack={props.onBack}
          clock={clock(at.now, zone, marks)}
          action={<LiveHeadActs {...foot} />}
        />
      }
      foot={wide ? undefined : <LiveFoot {...foot} problem={problem} />}
    >
      {wide ? <LiveNote charge={charge} offline={offline} problem={problem} /> : null}
      <Columns
        facts={wide ? <Facts {...props} stacked /> : undefined}
        work={<Work {...props} wide={wide} />}
        side={<Side {...props} />}
      />
      <LiveSheets
        charge={charge}
        now={at.now}
        sheet={props.sheet}
        acts={acts}
        people={props.people}
        stopDraft={props.stopDraft}
        onClose={() => props.onSheet(null)}
        onDropped={props.onBack}
      />
    </Screen>
  );
}

const isProven = (charge: ChargeDto) => charge.stage === 'ready' || charge.stage === 'fitted';

/** The groups with their target; once proven, how far off they are. */
function Facts({ charge, lagLimitVolts, stacked = false }: LiveScreenProps & { stacked?: boolean }) {
  return isProven(charge) && charge.restChecks.length > 0 ? (
    <ReadyPanel charge={charge} stacked={stacked} />
  ) : (
    <LiveLevels charge={charge} lagLimitVolts={lagLimitVolts} stacked={stacked} />
  );
}

function Work(props: LiveScreenProps & { wide: boolean }) {
  const { charge, at, knownAt, acts, topUp, wide, onSheet } = props;
  const styles = useStyles();
  const { now } = at;
  const offline = knownAt !== null;
  const proven = isProven(charge);
  const lines = { charge, now, busy: acts.busy, disabled: offline, describedBy: offline ? liveNoteId : undefined };
  return (
    <View style={styles.stack}>
      {proven ? (
        <StageLine charge={charge} now={now} knownAt={knownAt} />
      ) : (
        <LiveHead charge={charge} at={at} knownAt={knownAt} />
      )}
      {proven && !wide ? (
        <>
          <Facts {...props} />
          <Rule gap={4} />
        </>
      ) : null}
      {proven ? <ReadyFacts charge={charge} now={now} /> : null}
      <CardRibbon card={charge} at={at} height={proven ? 56 : 76} stale={offline} />
      {proven && charge.stage === 'ready' && props.type ? (
        <>
          <Rule gap={4} />
          <Suspense fallback={null}>
            <DriftLine charge={charge} type={props.type} now={now} />
          </Suspense>
        </>
      ) : null}
      {offline ? <AsKnown {...props} /> : null}
      <WaitingReadings
        charge={charge}
        waiting={props.waiting}
        now={now}
        device={wide ? 'device' : 'phone'}
        onRemove={props.onRemoveWaiting}
      />
      {offline && isUnderWay(charge) ? (
        <OfflineCaution charge={charge} now={now} device={wide ? 'device' : 'phone'} />
      ) : null}
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
      <LookInLine {...lines} onDone={acts.lookIn} />
      <CurrentLine {...lines} onOffAt={() => onSheet('off-since')} />
      <ClipOnLine {...lines} onChange={() => onSheet('clip-on')} />
      <Outcome {...props} />
      {wide || proven ? null : (
        <>
          <Rule gap={4} />
          <Facts {...props} />
        </>
      )}
      {isUnderWay(charge) ? (
        <>
          <SeenAndPlan charge={charge} now={now} />
          <Emergency />
        </>
      ) : null}
      {wide ? <Log {...props} /> : null}
    </View>
  );
}

/** What the figures on screen are from, while the link is down. */
function AsKnown({ charge, at, waiting }: LiveScreenProps) {
  const { zone, marks } = useFormats();
  const from = charge.lastReadingAt
    ? `From the reading at ${moment(Date.parse(charge.lastReadingAt), zone, at.now, marks)}.`
    : 'From the plan.';
  const below =
    waiting.length === 0
      ? ''
      : waiting.length === 1
        ? ' The reading below is not in it yet.'
        : ` The ${waiting.length} readings below are not in it yet.`;
  return (
    <Txt kind="small" tone="ink2">
      {`${from} The clock goes on here.${below}`}
    </Txt>
  );
}

function Log({ charge, at, onGo }: LiveScreenProps) {
  const correct = (reading: ReadingDto) => onGo(`/charges/${charge.id}/log?correct=${reading.id}`);
  return <ReadingLog charge={charge} now={at.now} onCorrect={correct} />;
}

function Side(props: LiveScreenProps) {
  const { charge, at, knownAt, onSheet } = props;
  const styles = useStyles();
  const wide = useBreakpoint() === 'wide';
  return (
    <View style={styles.side}>
      <WhoHasIt
        charge={charge}
        mayHandOver={props.mayHandOver}
        disabled={knownAt !== null}
        onHandOver={() => onSheet('hand-over')}
      />
      <Suspense fallback={null}>
        <LivePicture charge={charge} at={at} />
      </Suspense>
      {wide ? null : <Log {...props} />}
      <EventLog charge={charge} now={at.now} />
      <StandingLine />
    </View>
  );
}

/** Where a charge that is over has gone, and what it went on from. */
function Outcome({ charge, at, onGo }: LiveScreenProps) {
  const { zone, marks } = useFormats();
  return (
    <>
      {charge.stage === 'stopped' && charge.stoppedAt ? (
        <Txt>{`Stopped ${moment(Date.parse(charge.stoppedAt), zone, at.now, marks)}: ${charge.stopReason ?? 'no reason kept'}.`}</Txt>
      ) : null}
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

const useStyles = makeStyles(() => ({ stack: { rowGap: 8 }, side: { rowGap: 20 } }));
