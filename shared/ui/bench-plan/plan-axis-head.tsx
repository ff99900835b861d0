import { View } from 'react-native';
import { clock } from '../format/clock';
import { useFormats } from '../format/formats';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { radius } from '../theme/tokens';
import { TimeAxis } from '../wait-ribbon/time-axis';
import { NowLine } from './now-line';
import { axisTicks, flagWidth, flagX, nowX, type PlanAxis } from './plan-axis';

const axisHeight = 26;

/** The hours over the lanes, with the clock of now on its flag. Readers hear the times from the lanes. */
export function PlanAxisHead({ axis, now, stale }: { axis: PlanAxis; now: number; stale: boolean }) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const shown = nowX(axis, now) === null ? null : now;
  const spanS = (axis.to - axis.from) / 1000;
  const ticks = axisTicks(axis, zone, marks, shown).map(({ s, text, quiet }) => ({ s, text: quiet ? '' : text }));
  return (
    <View style={[styles.head, { width: axis.width }]} aria-hidden>
      <TimeAxis ticks={ticks} fromS={0} toS={spanS} width={axis.width} height={22} />
      {shown === null ? null : <NowLine x={nowX(axis, shown)} stale={stale} />}
      {shown === null ? null : (
        <View
          style={[styles.flag, stale && styles.staleFlag, { left: flagX(axis, shown, marks), width: flagWidth(marks) }]}
        >
          <Txt kind="numXS" tone={stale ? 'ink3' : 'onInk'} nowrap style={styles.clock}>
            {clock(shown, zone, marks)}
          </Txt>
        </View>
      )}
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  head: { height: axisHeight },
  flag: {
    position: 'absolute',
    top: -4,
    height: 26,
    borderRadius: radius.mark + 1,
    backgroundColor: colors.ink,
    alignItems: 'center',
    justifyContent: 'center',
    zIndex: 2,
  },
  // The link is down: the clock goes on, what is drawn does not.
  staleFlag: { backgroundColor: colors.ground, borderWidth: 1.5, borderColor: colors.ink3 },
  clock: { fontSize: 18, lineHeight: 26 },
}));
