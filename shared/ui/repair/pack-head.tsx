import { View } from 'react-native';
import { positionsOf } from '@/shared/contract/pack';
import { readingName, type PackReadingDto } from '@/shared/contract/pack-reading';
import type { RepairDto } from '@/shared/contract/repair';
import { firstName } from '../charge/card-model';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { celsius, voltsNumber } from '../format/quantities';
import { PackPicture } from '../pack-picture/pack-picture';
import { Num } from '../primitives/num';
import { Txt } from '../primitives/txt';
import { useBreakpoint } from '../theme/use-breakpoint';

/** A reading of the pack: spread, median and odd groups large, when and by whom, and the picture. */
export function PackHead({ reading, pack, now }: { reading: PackReadingDto; pack: RepairDto['pack']; now: number }) {
  const { zone, marks } = useFormats();
  const wide = useBreakpoint() === 'wide';
  const figures = [
    { name: 'Spread', value: String(Math.round(reading.spreadMillivolts)), unit: 'mV' },
    { name: `Median of ${reading.groupVolts.length}`, value: voltsNumber(reading.medianVolts, marks), unit: 'V' },
    { name: 'Odd', value: String(reading.odd.length), unit: reading.odd.length === 1 ? 'group' : 'groups' },
  ];
  const taken = [
    `${readingName(reading)}, ${moment(Date.parse(reading.at), zone, now, marks)}`,
    reading.celsius === null ? '' : `at ${celsius(reading.celsius)}`,
    `by ${firstName(reading.by.name)}`,
  ];
  return (
    <View style={{ rowGap: 10 }}>
      <View style={{ flexDirection: 'row', flexWrap: 'wrap', columnGap: wide ? 72 : 24, rowGap: 8 }}>
        {figures.map(({ name, value, unit }) => (
          <View key={name} style={{ flexGrow: wide ? 0 : 1 }}>
            <Txt kind="small" tone="ink2">
              {name}
            </Txt>
            <Num kind="numL" value={value} unit={unit} />
          </View>
        ))}
      </View>
      <Txt kind="small" tone="ink2">
        {taken.filter(Boolean).join(', ')}
      </Txt>
      {reading.setAside ? (
        <Txt kind="small" tone="alarm" bold>
          {`Set aside by ${firstName(reading.setAside.by.name)}: ${reading.setAside.reason}`}
        </Txt>
      ) : null}
      <PackPicture
        groupVolts={reading.groupVolts}
        medianVolts={reading.medianVolts}
        odd={reading.odd}
        positions={positionsOf(pack)}
        groupAmpHours={reading.groupAmpHours}
        height={wide ? 220 : 176}
      />
    </View>
  );
}
