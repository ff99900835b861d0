import { View } from 'react-native';
import type { SpareDto } from '@/shared/contract/spare';
import { useFormats } from '../format/formats';
import { EN_DASH } from '../format/marks';
import { ampHoursNumber, share } from '../format/quantities';
import { FullWidth } from '../primitives/full-width';
import { Num } from '../primitives/num';
import { Txt } from '../primitives/txt';
import { CapacityMark, capacityAxis } from './capacity-mark';
import { capacityBandOf, isCapacityGuessed, sourceWords } from './spare-words';

/** Capacity with its doubt and where it comes from, beside the label's. */
export function SpareCapacity({ spare, ratedAh }: { spare: SpareDto; ratedAh: number | null }) {
  const { marks } = useFormats();
  const band = capacityBandOf(spare);
  const guessed = isCapacityGuessed(spare);
  const axis = capacityAxis([band.low, band.high, ...(ratedAh === null ? [] : [ratedAh])]);
  return (
    <View>
      <View style={{ flexDirection: 'row', justifyContent: 'space-between', columnGap: 12 }}>
        <Txt kind="small" tone="ink2">
          Capacity of a group
        </Txt>
        <Txt kind="small" tone="ink2" align="right">
          {[
            guessed ? 'guessed' : sourceWords[spare.capacitySource],
            ratedAh === null ? '' : `${share(spare.usedCapacityAh / ratedAh)} of the label`,
          ]
            .filter(Boolean)
            .join(', ')}
        </Txt>
      </View>
      <View style={{ flexDirection: 'row', alignItems: 'baseline', columnGap: 10 }}>
        <Num kind="numL" value={ampHoursNumber(spare.usedCapacityAh, marks)} unit="Ah" />
        <Txt tone="ink2" nowrap>
          {`(${ampHoursNumber(band.low, marks)}${EN_DASH}${ampHoursNumber(band.high, marks)})`}
        </Txt>
      </View>
      <FullWidth height={66}>
        {(width) => (
          <CapacityMark
            {...band}
            {...axis}
            labelAh={ratedAh}
            dashed={guessed || spare.capacitySource !== 'measured'}
            width={width}
            ticks
          />
        )}
      </FullWidth>
      {guessed ? (
        <Txt kind="small" tone="ink2">
          Nobody has measured it. Measured, its band would be far narrower.
        </Txt>
      ) : null}
    </View>
  );
}
