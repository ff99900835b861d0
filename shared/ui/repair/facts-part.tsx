import { View } from 'react-native';
import type { RepairDto } from '@/shared/contract/repair';
import { firstName } from '../charge/card-model';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { NBSP } from '../format/marks';
import { celsius, millivolts, tolerance, volts } from '../format/quantities';
import { FactList, type Fact } from '../primitives/fact-list';
import { Txt } from '../primitives/txt';
import { typedNumber } from '../workshop/numbers-typed';
import { packWords, standing } from './repair-words';

/** What was booked, and what is known of the pack. */
export function FactsPart({ repair, now }: { repair: RepairDto; now: number }) {
  const { zone, marks } = useFormats();
  const at = (instant: string) => moment(Date.parse(instant), zone, now, marks);
  const warm = standing(repair.readings)[0]?.celsius ?? null;
  const spare = repair.spare;
  const facts: Fact[] = [
    { name: 'In since', value: at(repair.bookedAt) },
    ...(repair.promisedAt ? [{ name: 'Due', value: at(repair.promisedAt) }] : []),
    { name: 'With', value: repair.people.map(({ name }) => firstName(name)).join(', ') || 'nobody' },
    ...(repair.customerName ? [{ name: 'Customer', value: <Txt align="right">{repair.customerName}</Txt> }] : []),
    ...(repair.customerContact ? [{ name: 'Contact', value: <Txt align="right">{repair.customerContact}</Txt> }] : []),
    ...(repair.failing ? [{ name: 'Failing', value: `module ${repair.failing}` }] : []),
    ...(repair.pack.moduleTypeName ? [{ name: 'Module type', value: repair.pack.moduleTypeName }] : []),
    { name: 'Pack', value: <Txt align="right">{repair.packTypeName ?? packWords(repair.pack)}</Txt> },
    {
      name: 'Aim after the fit',
      value: millivolts(repair.pack.aimMillivolts / 1000),
      note:
        repair.pack.bleedAmps === null ? undefined : `bleeds ${typedNumber(repair.pack.bleedAmps, 0, marks)}${NBSP}A`,
    },
    ...(warm === null ? [] : [{ name: 'Pack at', value: celsius(warm) }]),
    ...(repair.target
      ? [
          {
            name: 'Target',
            value: volts(repair.target.volts, marks),
            note: tolerance(repair.target.toleranceMillivolts / 1000),
          },
        ]
      : []),
    ...(spare ? [{ name: 'Spare', value: [spare.label, spare.shelfPlace].filter(Boolean).join(', ') }] : []),
  ];
  return (
    <View style={{ rowGap: 4 }}>
      <Txt kind="heading" heading={2}>
        Facts
      </Txt>
      <FactList facts={facts} />
      {repair.note ? <Txt tone="ink2">{repair.note}</Txt> : null}
    </View>
  );
}
