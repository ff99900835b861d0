import { lazy, Suspense } from 'react';
import { View } from 'react-native';
import { clock } from '../format/clock';
import { useFormats } from '../format/formats';
import { StandingLine } from '../primitives/call-out';
import { Txt } from '../primitives/txt';
import { Columns } from '../screen/columns';
import { HeaderBar } from '../screen/header-bar';
import { Screen } from '../screen/screen';
import { makeStyles } from '../theme/make-styles';
import { useBreakpoint } from '../theme/use-breakpoint';
import { channelsOf } from './card-model';
import { EventLog } from './charge-log';
import { LiveFoot, LiveHeadActs, LiveNote } from './live-acts';
import { LiveFacts } from './live-facts';
import { WhoHasIt } from './live-lines';
import { isProven, type LiveScreenProps } from './live-props';
import { LiveSheets } from './live-sheets';
import { LiveReadings, LiveWork } from './live-work';

const LivePicture = lazy(() => import('./live-picture').then((module) => ({ default: module.LivePicture })));

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
          sub={[charge.spare.label, charge.typeName, channel && `${isProven(charge) ? 'off' : 'channel'} ${channel}`]
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
        facts={wide ? <LiveFacts {...props} stacked /> : undefined}
        work={<LiveWork {...props} />}
        side={<Side {...props} />}
      />
      <LiveSheets
        charge={charge}
        now={at.now}
        sheet={props.sheet}
        acts={acts}
        people={props.people}
        stopDraft={props.stopDraft}
        endDraft={props.endDraft}
        onClose={() => props.onSheet(null)}
        onDropped={props.onBack}
      />
    </Screen>
  );
}

/** Who has it, the picture, and what happened. */
function Side(props: LiveScreenProps) {
  const styles = useStyles();
  const { charge, at, knownAt, onSheet } = props;
  const wide = useBreakpoint() === 'wide';
  return (
    <View style={styles.side}>
      <Txt heading={2} style={styles.quiet}>
        Who has it, and how it goes
      </Txt>
      <WhoHasIt
        charge={charge}
        mayHandOver={props.mayHandOver}
        disabled={knownAt !== null}
        onHandOver={() => onSheet('hand-over')}
      />
      <Suspense fallback={null}>
        <LivePicture charge={charge} at={at} />
      </Suspense>
      {wide ? null : <LiveReadings {...props} />}
      <EventLog charge={charge} now={at.now} />
      <StandingLine />
    </View>
  );
}

const useStyles = makeStyles(() => ({
  side: { rowGap: 20 },
  // For readers only: it names what the picture's own heading stands under.
  quiet: { position: 'absolute', width: 1, height: 1, overflow: 'hidden' },
}));
