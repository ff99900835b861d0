import { View } from 'react-native';
import type { PlanOption } from '@/calc/plan-types';
import type { PlanDto } from '@/shared/contract/plan';
import { moment, readyAt, readyBounds, told } from '../format/clock';
import { duration } from '../format/duration';
import { useFormats } from '../format/formats';
import { Num } from '../primitives/num';
import { Span, Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';

/** When it is ready and when it has to be clipped on at the latest, epoch ms. */
export function outcomeOf(dto: PlanDto, option: PlanOption) {
  const zero = Date.parse(dto.clipOnAt);
  const planned = Date.parse(dto.plannedAt);
  const { p10, p50, p90 } = option.totalS;
  return {
    ready: { p10: zero + p10 * 1000, p50: zero + p50 * 1000, p90: zero + p90 * 1000 },
    latestStart: option.latestStartS === null ? null : planned + option.latestStartS * 1000,
    /** Minutes between the clip-on and the latest one, s; negative: too late already. */
    slackS: option.latestStartS === null ? null : option.latestStartS - (zero - planned) / 1000,
  };
}

/** The one line over the foot's buttons. */
export function OutcomeLine({ dto, option, now }: { dto: PlanDto; option: PlanOption; now: number }) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const { ready, latestStart, slackS } = outcomeOf(dto, option);
  return (
    <View style={styles.line}>
      <Txt nowrap>
        {'Ready '}
        <Span bold>{readyAt(ready, zone, now, marks)}</Span>
        {` (${readyBounds(ready, zone, now, marks)})`}
      </Txt>
      {latestStart === null ? null : (
        <Txt tone={slackS !== null && slackS < 0 ? 'alarm' : 'ink2'} nowrap>
          {slackS !== null && slackS < 0 ? 'latest start was ' : 'latest start '}
          <Span bold>{moment(told(latestStart, latestStart, now), zone, now, marks)}</Span>
        </Txt>
      )}
    </View>
  );
}

/** The same large, in the side column of the desk. */
export function OutcomeLarge({ dto, option, now }: { dto: PlanDto; option: PlanOption; now: number }) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const { ready, latestStart, slackS } = outcomeOf(dto, option);
  return (
    <View style={styles.line}>
      <View>
        <Txt kind="small" tone="ink2">
          Ready
        </Txt>
        <Num kind="numL" value={readyAt(ready, zone, now, marks)} />
        <Txt tone="ink2" nowrap>{`(${readyBounds(ready, zone, now, marks)})`}</Txt>
      </View>
      {latestStart === null || slackS === null ? null : (
        <View style={styles.right}>
          <Txt kind="small" tone="ink2">
            Latest start
          </Txt>
          <Num
            kind="numL"
            align="right"
            tone={slackS < 0 ? 'alarm' : 'ink'}
            value={moment(told(latestStart, latestStart, now), zone, now, marks)}
          />
          <Txt tone={slackS < 0 ? 'alarm' : 'ink2'} nowrap>
            {slackS < 0 ? `${duration(-slackS)} too late` : `${duration(slackS)} of slack`}
          </Txt>
        </View>
      )}
    </View>
  );
}

const useStyles = makeStyles(() => ({
  line: {
    flexDirection: 'row',
    flexWrap: 'wrap',
    alignItems: 'baseline',
    justifyContent: 'space-between',
    columnGap: 12,
  },
  right: { alignItems: 'flex-end' },
}));
