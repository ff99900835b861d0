import { View } from 'react-native';
import { groupsAt } from '@/shared/contract/pack';
import type { PackReadingDto, SecondSourceDto } from '@/shared/contract/pack-reading';
import type { RepairDto } from '@/shared/contract/repair';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { celsius, voltsNumber } from '../format/quantities';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { Surface } from '../theme/surface';
import { radius } from '../theme/tokens';

/** What the pack says beside what the meter says: module, volts, who and when. */
export function TwoSources({
  pack,
  reading,
  source,
  meterName,
  now,
}: {
  pack: RepairDto['pack'];
  reading: PackReadingDto;
  source: SecondSourceDto;
  /** Null: not known. */
  meterName: string | null;
  now: number;
}) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const groups = groupsAt(pack, source.modulePosition);
  const at = (instant: string) => moment(Date.parse(instant), zone, now, marks);
  const listed = (volts: readonly number[]) =>
    `${groups.map((group, place) => `G${group + 1} ${voltsNumber(volts[place] ?? 0, marks)}`).join(', ')} V`;
  const says = source.pointsTo ?? source.modulePosition;
  return (
    <View style={{ rowGap: 8 }}>
      <View style={styles.pair}>
        <Surface tone="sheet" style={styles.sheet}>
          <Txt kind="small" tone="ink2">
            The pack says
          </Txt>
          <Txt kind="numL">{reading.oddPositions[0] ?? '–'}</Txt>
          <Txt kind="small" tone="ink2">
            {`Module ${source.modulePosition}: ${listed(groups.map((group) => reading.groupVolts[group] ?? 0))}`}
          </Txt>
          <Txt kind="small" tone="ink2">
            {`read ${at(reading.at)}${reading.celsius === null ? '' : `, ${celsius(reading.celsius)}`}`}
          </Txt>
        </Surface>
        <Surface tone="sheet" style={styles.sheet}>
          <Txt kind="small" tone="ink2">
            The meter says
          </Txt>
          <Txt kind="numL">{source.agrees || source.pointsTo !== null ? says : `not ${says}`}</Txt>
          <Txt kind="small" tone="ink2">{`Module ${source.modulePosition}: ${listed(source.groupVolts)}`}</Txt>
          <Txt kind="small" tone="ink2">{`${source.by.name} ${at(source.at)}${meterName ? `, ${meterName}` : ''}`}</Txt>
        </Surface>
      </View>
    </View>
  );
}

const useStyles = makeStyles(() => ({
  pair: { flexDirection: 'row', flexWrap: 'wrap', gap: 12 },
  sheet: { flexGrow: 1, flexBasis: 150, minWidth: 0, padding: 12, borderRadius: radius.sheet, rowGap: 4 },
}));
