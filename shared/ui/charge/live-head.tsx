import { View } from 'react-native';
import type { ChargeDto } from '@/shared/contract/charge';
import { moment, readyAt, readyBounds } from '../format/clock';
import { duration, overBy } from '../format/duration';
import { useFormats } from '../format/formats';
import { Duration } from '../primitives/num';
import { Txt } from '../primitives/txt';
import { StageTag } from '../stage/stage-tag';
import { freshTone } from '../states/stale';
import { makeStyles } from '../theme/make-styles';
import { isFlowing, isToCome, leftS, markOf, readyOf, stageWords, type CardClock } from './card-model';

/** What comes next by the clock, at the right of the stage's line. */
function coming(charge: ChargeDto, at: (instant: string) => string): string {
  if (isFlowing(charge) && charge.stage !== 'tapering' && charge.taperAt) return `taper about ${at(charge.taperAt)}`;
  if (isFlowing(charge) && charge.currentEndAt) return `ends about ${at(charge.currentEndAt)}`;
  if (charge.stage === 'resting' && charge.checkDueAt) return `check at ${at(charge.checkDueAt)}`;
  if (isToCome(charge)) return `clip on at ${at(charge.clipOnAt)}`;
  if (charge.stage === 'held' && charge.heldAt) return `since ${at(charge.heldAt)}`;
  if (charge.stage === 'ready' && charge.readyAt) return `since ${at(charge.readyAt)}`;
  if (charge.stage === 'stopped' && charge.stoppedAt) return `at ${at(charge.stoppedAt)}`;
  return '';
}

/** Stage and what comes next: the first line of the live screen. */
export function StageLine({ charge, now, knownAt }: { charge: ChargeDto; now: number; knownAt: number | null }) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const at = (instant: number) => moment(instant, zone, now, marks);
  return (
    <View style={styles.line}>
      <StageTag
        stage={markOf(charge)}
        text={charge.overdueSince ? `Overdue, ${stageWords(charge).toLowerCase()}` : stageWords(charge)}
      />
      <Txt kind="small" tone="ink2" align="right" style={styles.coming}>
        {knownAt === null ? coming(charge, (instant) => at(Date.parse(instant))) : `as known at ${at(knownAt)}`}
      </Txt>
    </View>
  );
}

/**
 * Stage, the number that leads the screen, and when it will be ready with its band.
 *
 * @param knownAt when the link is down: the instant the figures are from
 */
export function LiveHead({ charge, at, knownAt }: { charge: ChargeDto; at: CardClock; knownAt: number | null }) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const { now } = at;
  const old = knownAt !== null;
  const tone = freshTone(old);
  const quiet = old ? 'ink3' : 'ink2';
  const band = readyOf(charge, at);
  const left = leftS(charge, at);
  const waiting = charge.stage === 'check-due' && charge.checkDueAt ? Date.parse(charge.checkDueAt) : null;
  const rested = charge.currentEndAt ? duration((now - Date.parse(charge.currentEndAt)) / 1000, 'minute') : null;
  return (
    <View>
      <StageLine charge={charge} now={now} knownAt={knownAt} />
      {waiting !== null ? (
        <View style={styles.number}>
          <Duration seconds={Math.max(0, (now - waiting) / 1000)} precision="minute" kind="live" tone={tone} />
          <View>
            <Txt kind="small" tone={quiet}>
              the check waits
            </Txt>
            {rested === null ? null : (
              <Txt kind="numM" tone={tone} nowrap>
                rested {rested}
              </Txt>
            )}
          </View>
        </View>
      ) : band && left !== null ? (
        <View style={styles.number}>
          <Duration seconds={left} precision={isToCome(charge) ? 'plan' : 'minute'} kind="live" tone={tone} />
          <View>
            <Txt kind="small" tone={quiet}>
              ready
            </Txt>
            <Txt kind="numM" tone={tone} nowrap>
              {readyAt(band, zone, now, marks)}
            </Txt>
            <Txt tone={quiet} nowrap>{`(${readyBounds(band, zone, now, marks)})`}</Txt>
          </View>
        </View>
      ) : (
        <Txt kind="numL" tone={tone} style={styles.word}>
          {wordOf(charge)}
        </Txt>
      )}
      {charge.overdueSince ? (
        <Txt tone="alarm" bold>
          {overBy((now - Date.parse(charge.overdueSince)) / 1000)}
        </Txt>
      ) : null}
    </View>
  );
}

const words: Partial<Record<ChargeDto['stage'], string>> = {
  stopped: 'Stopped',
  shelved: 'Back on the shelf',
  fitted: 'Fitted',
  ready: 'Ready, to be fitted',
};
const wordOf = (charge: ChargeDto): string => words[charge.stage] ?? 'Not reckoned yet';

const useStyles = makeStyles(() => ({
  line: { flexDirection: 'row', justifyContent: 'space-between', alignItems: 'center', columnGap: 12, minHeight: 24 },
  coming: { flexShrink: 1 },
  number: {
    flexDirection: 'row',
    alignItems: 'flex-end',
    columnGap: 18,
    rowGap: 8,
    flexWrap: 'wrap',
    marginTop: 12,
    marginBottom: 8,
  },
  word: { marginVertical: 12 },
}));
