import { View } from 'react-native';
import type { FittedSpareDto } from '@/shared/contract/repair';
import { firstName } from '../charge/card-model';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { voltsNumber } from '../format/quantities';
import { Txt } from '../primitives/txt';

/** Spares that went in without a charge; those of a charge stand with it. */
export function FittedPart({ fitted, now }: { fitted: readonly FittedSpareDto[]; now: number }) {
  const { zone, marks } = useFormats();
  if (fitted.length === 0) return null;
  return (
    <View style={{ rowGap: 6 }}>
      <Txt kind="heading" heading={2}>
        Fitted without a charge
      </Txt>
      {fitted.map(({ id, spare, modulePosition, groupVolts, note, at, by }) => (
        <View key={id}>
          <Txt>{`${spare.label}${modulePosition === null ? '' : ` as module ${modulePosition}`}, at ${groupVolts.map((volts) => voltsNumber(volts, marks)).join(', ')} V`}</Txt>
          <Txt kind="small" tone="ink2">
            {[`${firstName(by.name)}, ${moment(Date.parse(at), zone, now, marks)}`, note].filter(Boolean).join(' · ')}
          </Txt>
        </View>
      ))}
    </View>
  );
}
