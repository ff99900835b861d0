import { View } from 'react-native';
import { chemistryIds, chemistryNames, resistanceKinds } from '@/shared/contract/equipment';
import { BoundField, BoundSelect, type TypedForm } from '../forms/bound';
import { Txt } from '../primitives/txt';
import { FieldGrid, FormPart } from './field-grid';
import { resistanceNames, typeFieldNames as names, type TypeTexts } from './type-form';

const chemistries = chemistryIds.map((id) => ({ value: id, label: chemistryNames[id] }));
const kinds = resistanceKinds.map((kind) => ({ value: kind, label: resistanceNames[kind] }));

/** Everything a module type is: what it is, the maker's limits, and what this workshop keeps of it. */
export function TypeFields({ form, readOnly }: { form: TypedForm<TypeTexts>; readOnly: boolean }) {
  const number = (name: keyof TypeTexts & keyof typeof names, unit?: string, hint?: string) => (
    <BoundField
      key={name}
      form={form}
      name={name}
      label={names[name]}
      kind={unit === undefined ? 'whole' : 'decimal'}
      unit={unit}
      hint={hint}
      readOnly={readOnly}
      nextKey="next"
    />
  );
  return (
    <View style={{ rowGap: 24, paddingBottom: 8 }}>
      <FormPart title="What it is">
        <FieldGrid two>
          <BoundField form={form} name="name" label={names.name} required readOnly={readOnly} nextKey="next" />
          <BoundSelect
            form={form}
            name="chemistry"
            label={names.chemistry}
            options={chemistries}
            empty="Choose"
            readOnly={readOnly}
          />
        </FieldGrid>
        <FieldGrid>
          {number('groupsInSeries')}
          {number('cellsInParallel')}
          {number('ratedAh', 'Ah', 'of one group')}
        </FieldGrid>
      </FormPart>
      <FormPart title="Limits, from the maker" note="Volts of one group. No charge is planned beyond them.">
        <FieldGrid>
          {number('chargeLimitVolts', 'V')}
          {number('dischargeLimitVolts', 'V')}
          {number('floorVolts', 'V', 'under it: never charged')}
        </FieldGrid>
        <FieldGrid two>
          {number('maxChargeAmps', 'A')}
          {number('maxDischargeAmps', 'A')}
          {number('minChargeCelsius', '°C')}
          {number('maxChargeCelsius', '°C')}
          {number('coldCurrentPercent', '%', 'of the current; empty: all')}
          {number('warmCurrentPercent', '%', 'of the current; empty: all')}
        </FieldGrid>
        <FieldGrid>{number('prechargeBelowVolts', 'V', 'a group under it comes up at C/10 first')}</FieldGrid>
      </FormPart>
      <FormPart title="Kept here" note="Left empty, the usual value of the chemistry is taken and the band is wider.">
        <FieldGrid>
          {number('shelfVolts', 'V', 'spares rest at this')}
          {number('selfDischargePercentPerMonth', '%', 'a month')}
          {number('linkMilliohm', 'mΩ', 'busbars between two groups')}
          {number('resistanceMilliohm', 'mΩ', 'of one group, at 25 °C')}
          <BoundSelect
            form={form}
            name="resistanceKind"
            label={names.resistanceKind}
            options={kinds}
            readOnly={readOnly}
          />
        </FieldGrid>
        <Txt kind="small" tone="ink2">
          Two pulses of the same current tell how fast the voltage follows: all four numbers, or none.
        </Txt>
        <FieldGrid two>
          {number('pulseShortS', 's', 'as 0.5 s')}
          {number('pulseShortMilliohm', 'mΩ', 'of one group')}
          {number('pulseLongerS', 's', 'as 30 s')}
          {number('pulseLongerMilliohm', 'mΩ', 'of one group')}
        </FieldGrid>
        <BoundField form={form} name="note" label={names.note} multiline lines={2} readOnly={readOnly} />
      </FormPart>
    </View>
  );
}
