import { View } from 'react-native';
import { Path, Svg } from 'react-native-svg';
import type { ChargeDto } from '@/shared/contract/charge';
import { ampHoursNumber, celsius, deviationWords, millivolts, tolerance, voltsNumber } from '../format/quantities';
import { useFormats } from '../format/formats';
import { LevelColumn } from '../level-column/level-column';
import { Num } from '../primitives/num';
import { Span, Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { useTheme } from '../theme/theme';
import { columnGroups, columnScale } from './card-drawings';
import { isFlowing, stageOf } from './card-model';

/** The lagging group in words, and where it will end by the plan; null: none lags. */
function lagWords(charge: ChargeDto): { lags: string; ends: string } | null {
  if (charge.laggingGroup === null) return null;
  const lags = `G${charge.laggingGroup + 1} lags ${millivolts(charge.lagVolts)}.`;
  const planned = charge.option.endGroupVolts[charge.laggingGroup];
  if (planned === undefined) return { lags, ends: '' };
  const end = planned - charge.targetVolts;
  return {
    lags,
    ends:
      Math.abs(end) <= charge.toleranceVolts
        ? `By the plan it ends within ${millivolts(charge.toleranceVolts)}.`
        : `By the plan it ends ${deviationWords(end)}.`,
  };
}

/** The current has done its part: nothing more is brought in. */
const isOver = (charge: ChargeDto): boolean =>
  charge.startedAt !== null && !isFlowing(charge) && charge.stage !== 'held';

/** 'Still to bring in' */
function chargeWords(charge: ChargeDto): string {
  const down = charge.direction === 'discharge';
  if (isOver(charge)) return down ? 'Taken out' : 'Brought in';
  if (charge.startedAt === null) return down ? 'To take out' : 'To bring in';
  return down ? 'Still to take out' : 'Still to bring in';
}

/**
 * The groups as they stand, the target, and what is still to bring in.
 *
 * @param stacked the facts stand under the column: the left column of the desk
 */
export function LiveLevels({
  charge,
  lagLimitVolts,
  stacked = false,
}: {
  charge: ChargeDto;
  lagLimitVolts?: number;
  stacked?: boolean;
}) {
  const styles = useStyles();
  const { colors } = useTheme();
  const { marks } = useFormats();
  const down = charge.direction === 'discharge';
  const left = Math.max(0, charge.plannedAh - charge.deliveredAh);
  const lag = lagWords(charge);
  const begun = charge.startedAt !== null;
  const over = isOver(charge);
  return (
    <View>
      <View style={stacked ? styles.stack : styles.row}>
        <LevelColumn
          place="live"
          stage={stageOf(charge)}
          groups={columnGroups(charge, { lagLimitVolts, text: (volts) => voltsNumber(volts, marks) })}
          targetVolts={charge.targetVolts}
          toleranceVolts={charge.toleranceVolts}
          scale={columnScale(charge, 'live', lagLimitVolts)}
          reckoned={charge.groups.some((group) => group.reckoned)}
          name={charge.spare.label}
          labels
          ends
          tab
          moving
        />
        <View style={[styles.facts, stacked && styles.factsUnder]}>
          <View>
            <Txt kind="small" tone="ink2">
              Target
            </Txt>
            <Num value={voltsNumber(charge.targetVolts, marks)} unit="V" />
            <Txt kind="small" tone="ink2">
              {`${tolerance(charge.toleranceVolts)}${charge.targetCelsius === null ? '' : `, at ${celsius(charge.targetCelsius)}`}`}
            </Txt>
          </View>
          <View>
            <Txt kind="small" tone="ink2">
              {chargeWords(charge)}
            </Txt>
            <Num value={ampHoursNumber(over ? charge.deliveredAh : left, marks)} unit="Ah" />
            {begun ? (
              <Txt kind="small" tone="ink2">
                {over
                  ? `of ${ampHoursNumber(charge.plannedAh, marks)} Ah planned`
                  : `${ampHoursNumber(charge.deliveredAh, marks)} of ${ampHoursNumber(charge.plannedAh, marks)} Ah ${down ? 'out' : 'in'}`}
              </Txt>
            ) : null}
          </View>
          {lag ? (
            <Txt>
              <Span bold>{lag.lags}</Span> {lag.ends}
            </Txt>
          ) : null}
        </View>
      </View>
      {isFlowing(charge) ? (
        <View style={styles.key}>
          <Svg width={10} height={13} viewBox="0 0 10 13" style={styles.mark} aria-hidden>
            <Path d="M1 6.5l8-6v12z" fill={colors.ink2} />
          </Svg>
          <Txt kind="small" tone="ink2" style={styles.keyWords}>
            at the clips, while current flows. The fill is the rest voltage reckoned from it; the line across it is
            where the charge began.
          </Txt>
        </View>
      ) : null}
    </View>
  );
}

const useStyles = makeStyles(() => ({
  row: { flexDirection: 'row', columnGap: 18, marginBottom: 8 },
  stack: { rowGap: 12, marginBottom: 8 },
  facts: { flex: 1, minWidth: 110, rowGap: 14, paddingTop: 20 },
  factsUnder: { paddingTop: 0 },
  key: { flexDirection: 'row', columnGap: 8 },
  mark: { marginTop: 3 },
  keyWords: { flex: 1 },
}));
