import { View } from 'react-native';
import type { ChargeDto } from '@/shared/contract/charge';
import { ampHoursNumber, celsius, deviationWords, millivolts, tolerance, voltsNumber } from '../format/quantities';
import { useFormats } from '../format/formats';
import { LevelColumn } from '../level-column/level-column';
import { Num } from '../primitives/num';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { columnGroups, columnScale } from './card-drawings';
import { isFlowing, stageOf } from './card-model';

/** The lagging group in words, and whether it will end within the tolerance. */
function lagWords(charge: ChargeDto): string | null {
  if (charge.laggingGroup === null) return null;
  const name = `G${charge.laggingGroup + 1}`;
  const planned = charge.option.endGroupVolts[charge.laggingGroup];
  const end = planned === undefined ? null : planned - charge.targetVolts;
  const lag = `${name} lags ${millivolts(Math.abs(charge.lagVolts))}.`;
  if (end === null) return lag;
  return Math.abs(end) <= charge.toleranceVolts
    ? `${lag} It will end within ${millivolts(charge.toleranceVolts)}.`
    : `${lag} By the plan it ends ${deviationWords(end)}.`;
}

/** The groups as they stand, the target, and what is still to bring in. */
export function LiveLevels({ charge }: { charge: ChargeDto }) {
  const styles = useStyles();
  const { marks } = useFormats();
  const down = charge.direction === 'discharge';
  const left = Math.max(0, charge.plannedAh - charge.deliveredAh);
  const lag = lagWords(charge);
  return (
    <View>
      <View style={styles.row}>
        <LevelColumn
          place="live"
          stage={stageOf(charge)}
          groups={columnGroups(charge, (volts) => voltsNumber(volts, marks))}
          targetVolts={charge.targetVolts}
          toleranceVolts={charge.toleranceVolts}
          scale={columnScale(charge, 'live')}
          reckoned={charge.groups.some((group) => group.reckoned)}
          name={charge.spare.label}
          labels
          ends
          tab
          moving
        />
        <View style={styles.facts}>
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
              {down ? 'Still to take out' : 'Still to bring in'}
            </Txt>
            <Num value={ampHoursNumber(left, marks)} unit="Ah" />
            <Txt kind="small" tone="ink2">
              {`${ampHoursNumber(charge.deliveredAh, marks)} of ${ampHoursNumber(charge.plannedAh, marks)} Ah ${down ? 'out' : 'in'}`}
            </Txt>
          </View>
          {lag ? <Txt>{lag}</Txt> : null}
        </View>
      </View>
      {isFlowing(charge) ? (
        <Txt kind="small" tone="ink2">
          ◀ at the clips, while current flows. The fill is the rest voltage reckoned from it; the line across it is
          where the charge began.
        </Txt>
      ) : null}
    </View>
  );
}

const useStyles = makeStyles(() => ({
  row: { flexDirection: 'row', columnGap: 18, marginBottom: 8 },
  facts: { flex: 1, minWidth: 110, rowGap: 14, paddingTop: 20 },
}));
