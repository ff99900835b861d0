import { useController, useWatch, type UseFormReturn } from 'react-hook-form';
import { View } from 'react-native';
import type { ModuleTypeDto } from '@/shared/contract/equipment';
import type { PackTypeDto } from '@/shared/contract/pack';
import { fieldSentence } from '@/shared/contract/field-sentence';
import { daysBetween } from '../format/zone';
import { useFormats } from '../format/formats';
import { BoundField } from '../forms/bound';
import { ChoiceRow } from '../primitives/choice-row';
import { DateTimeField } from '../primitives/date-time-field';
import { Select } from '../primitives/select';
import { Txt } from '../primitives/txt';
import { PackFields } from './pack-fields';
import { aimWords, packTexts } from './pack-form';
import type { RepairTyped } from './repair-form';
import { packWords } from './repair-words';

export interface RepairFieldsProps {
  form: UseFormReturn<RepairTyped, unknown, RepairTyped>;
  /** A new one may be given its number. */
  fresh: boolean;
  /** A reading stands. */
  fixedCount: boolean;
  packTypes: readonly PackTypeDto[];
  moduleTypes: readonly ModuleTypeDto[];
  people: readonly { id: string; name: string }[];
  today: string;
}

/** What is booked: the vehicle in the workshop's own words, its pack, the promise, the bay and the people. */
export function RepairFields({ form, fresh, fixedCount, packTypes, moduleTypes, people, today }: RepairFieldsProps) {
  return (
    <View style={{ rowGap: 16 }}>
      <BoundField
        form={form}
        name="vehicle"
        label="Vehicle"
        hint="in your own words: Grey van"
        required
        nextKey="next"
      />
      {fresh ? (
        <BoundField
          form={form}
          name="number"
          label="Repair number"
          kind="label"
          hint="left empty: the next one"
          nextKey="next"
        />
      ) : null}
      <PackChoice form={form} packTypes={packTypes} moduleTypes={moduleTypes} fixedCount={fixedCount} />
      <Promised form={form} today={today} />
      <BoundField form={form} name="bay" label="Bay" hint="where it stands: bay 3" nextKey="next" />
      <PeopleChoice form={form} people={people} />
      <BoundField form={form} name="customerName" label="Customer" nextKey="next" />
      <BoundField form={form} name="customerContact" label="Contact" hint="telephone or e-mail" nextKey="next" />
      <BoundField form={form} name="note" label="Note" multiline lines={3} />
    </View>
  );
}

const own = 'own';

function PackChoice({
  form,
  packTypes,
  moduleTypes,
  fixedCount,
}: Pick<RepairFieldsProps, 'form' | 'packTypes' | 'moduleTypes' | 'fixedCount'>) {
  const { marks } = useFormats();
  const packTypeId = useWatch({ control: form.control, name: 'packTypeId' });
  const chosen = packTypes.find(({ id }) => id === packTypeId);
  const choose = (id: string) => {
    const type = packTypes.find((one) => one.id === id);
    form.setValue('packTypeId', type ? type.id : '', { shouldDirty: true });
    if (type) form.setValue('pack', packTexts(type.pack, marks), { shouldDirty: true });
    form.clearErrors('pack');
  };
  return (
    <View role="group" aria-label="The pack" style={{ rowGap: 16 }}>
      <Txt kind="heading" heading={2}>
        The pack
      </Txt>
      {packTypes.length > 0 ? (
        <Select
          label="Pack type"
          value={chosen ? chosen.id : own}
          options={[
            { value: own, label: 'Its own numbers' },
            ...packTypes.map(({ id, name }) => ({ value: id, label: name })),
          ]}
          onChange={choose}
        />
      ) : null}
      {chosen ? (
        <Txt tone="ink2">
          {[packWords(chosen.pack), chosen.pack.moduleTypeName, aimWords(chosen.pack, marks), chosen.note]
            .filter(Boolean)
            .join(' · ')}
        </Txt>
      ) : (
        <PackFields form={form} types={moduleTypes} fixedCount={fixedCount} />
      )}
    </View>
  );
}

function Promised({ form, today }: Pick<RepairFieldsProps, 'form' | 'today'>) {
  const { field, fieldState } = useController({ control: form.control, name: 'promisedAt' });
  const off = daysBetween(today, field.value.day);
  return (
    <DateTimeField
      label="Promised for"
      value={field.value}
      onChange={field.onChange}
      onBlur={field.onBlur}
      today={today}
      from={Math.min(0, off)}
      to={Math.max(60, off)}
      hint="left empty: nothing was promised"
      error={fieldState.error ? fieldSentence(fieldState.error.message) : undefined}
    />
  );
}

/** Who works on it; the one chosen first is asked first. */
function PeopleChoice({ form, people }: Pick<RepairFieldsProps, 'form' | 'people'>) {
  const { field, fieldState } = useController({ control: form.control, name: 'personIds' });
  const chosen = field.value;
  return (
    <View role="group" aria-label="Who works on it" style={{ rowGap: 6 }}>
      <Txt kind="label">Who works on it</Txt>
      {people.map(({ id, name }) => (
        <ChoiceRow
          key={id}
          mark="tick"
          chosen={chosen.includes(id)}
          title={name}
          meaning={chosen[0] === id && chosen.length > 1 ? 'is asked first' : undefined}
          onPress={() => field.onChange(chosen.includes(id) ? chosen.filter((one) => one !== id) : [...chosen, id])}
        />
      ))}
      {fieldState.error ? (
        <Txt kind="small" tone="alarm" bold>
          {fieldState.error.message}
        </Txt>
      ) : null}
    </View>
  );
}
