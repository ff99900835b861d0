import { View } from 'react-native';
import type { ChargeDto } from '@/shared/contract/charge';
import { clock, readyAt, readyBounds } from '../format/clock';
import { duration, overBy } from '../format/duration';
import { useFormats } from '../format/formats';
import { Duration } from '../primitives/num';
import { Txt } from '../primitives/txt';
import { StageTag } from '../stage/stage-tag';
import { freshTone } from '../states/stale';
import { makeStyles } from '../theme/make-styles';
import { isFlowing, markOf, readyOf, stageWords } from './card-model';

/** The end of the stage by the clock, at the right of its line. */
function coming(charge: ChargeDto, at: (instant: string) => string): string {
  if (isFlowing(charge) && charge.stage !== 'tapering' && charge.taperAt) return `taper about ${at(charge.taperAt)}`;
  if (isFlowing(charge) && charge.currentEndAt) return `current ends about ${at(charge.currentEndAt)}`;
  if (charge.stage === 'resting' && charge.checkDueAt) return `check at ${at(charge.checkDueAt)}`;
  if (charge.stage === 'queued' || charge.stage === 'planned') return `clip on at ${at(charge.clipOnAt)}`;
  return '';
}

/** Stage, the number that leads the screen, and when it will be ready with its band. */
export function LiveHead({ charge, now, old }: { charge: ChargeDto; now: number; old: boolean }) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const at = (instant: string) => clock(Date.parse(instant), zone, marks);
  const band = readyOf(charge, now);
  const tone = freshTone(old);
  const begins = charge.startedAt === null ? Date.parse(charge.clipOnAt) : now;
  const waited =
    charge.stage === 'check-due' && charge.checkDueAt ? (now - Date.parse(charge.checkDueAt)) / 1000 : null;
  return (
    <View>
      <View style={styles.line}>
        <StageTag
          stage={markOf(charge)}
          text={charge.overdueSince ? `Overdue, ${stageWords(charge).toLowerCase()}` : stageWords(charge)}
        />
        <Txt kind="small" tone="ink2" nowrap>
          {coming(charge, at)}
        </Txt>
      </View>
      <View style={styles.number}>
        {charge.stage === 'ready' || charge.stage === 'fitted' ? (
          <Txt kind="numL">{charge.stage === 'fitted' ? 'Fitted' : 'Ready, to be fitted'}</Txt>
        ) : charge.stage === 'shelved' || charge.stage === 'stopped' ? (
          <Txt kind="numL">{charge.stage === 'stopped' ? 'Stopped' : 'Back on the shelf'}</Txt>
        ) : waited !== null ? (
          <Duration seconds={Math.max(0, waited)} precision="minute" kind="live" tone={tone} />
        ) : band ? (
          <Duration
            seconds={Math.max(0, (band.p50 - begins) / 1000)}
            precision={charge.startedAt ? 'minute' : 'plan'}
            kind="live"
            tone={tone}
          />
        ) : (
          <Txt kind="numL" tone="ink3">
            Not reckoned yet
          </Txt>
        )}
        {waited !== null ? (
          <View>
            <Txt tone="ink2">check waiting</Txt>
            <Txt kind="numM" tone={tone}>
              {charge.currentEndAt
                ? `rested ${duration((now - Date.parse(charge.currentEndAt)) / 1000, 'minute')}`
                : ''}
            </Txt>
          </View>
        ) : band && charge.stage !== 'ready' ? (
          <View>
            <Txt tone="ink2">ready</Txt>
            <Txt kind="numM" tone={tone}>
              {readyAt(band, zone, now, marks)}
            </Txt>
            <Txt tone={old ? 'ink3' : 'ink2'} nowrap>{`(${readyBounds(band, zone, now, marks)})`}</Txt>
          </View>
        ) : null}
      </View>
      {charge.overdueSince ? (
        <Txt tone="alarm" bold>
          {overBy((now - Date.parse(charge.overdueSince)) / 1000)}
        </Txt>
      ) : null}
    </View>
  );
}

const useStyles = makeStyles(() => ({
  line: { flexDirection: 'row', justifyContent: 'space-between', alignItems: 'center', columnGap: 12, minHeight: 32 },
  number: {
    flexDirection: 'row',
    alignItems: 'flex-end',
    columnGap: 18,
    flexWrap: 'wrap',
    marginTop: 8,
    marginBottom: 8,
  },
}));
