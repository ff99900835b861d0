import { View } from 'react-native';
import { useChargers } from '@/shared/client/chargers';
import { useModuleTypes } from '@/shared/client/module-types';
import { Field } from '@/shared/ui/primitives/field';
import { Select } from '@/shared/ui/primitives/select';
import type { LeverAsk, LeverField, LeverKey, LeverTyped } from '@/shared/ui/waits/lever-form';

interface FieldsProps {
  typed: LeverTyped;
  errors: LeverAsk['errors'];
  onChange: (next: LeverTyped) => void;
}

/** What a lever has to be told; nothing of those that are plain yes. */
export function LeverFields({ lever, ...props }: FieldsProps & { lever: LeverKey }) {
  if (lever === 'moreLikeChannelId') return <ChannelChoice {...props} field="moreChannelId" />;
  if (lever === 'amps')
    return (
      <View style={{ rowGap: 10 }}>
        <ChannelChoice {...props} field="ampsChannelId" />
        <NumberField {...props} field="amps" label="Amps" unit="A" />
      </View>
    );
  if (lever === 'lookInMinutes')
    return <NumberField {...props} field="lookInMinutes" label="Look in every" unit="min" />;
  if (lever === 'shelf')
    return (
      <View style={{ rowGap: 10 }}>
        <TypeChoice {...props} />
        <NumberField {...props} field="shelfVolts" label="Volts of a group" unit="V" />
      </View>
    );
  return null;
}

const errorOf = (errors: LeverAsk['errors'], field: LeverField) => {
  const error = errors[field];
  return error === undefined ? {} : { error };
};

function ChannelChoice({ typed, errors, onChange, field }: FieldsProps & { field: 'moreChannelId' | 'ampsChannelId' }) {
  const options = useChannelOptions();
  return (
    <Select
      label="Like channel"
      size="low"
      empty="Choose a channel"
      value={typed[field] === '' ? null : typed[field]}
      options={options}
      onChange={(value) => onChange({ ...typed, [field]: value })}
      {...errorOf(errors, field)}
    />
  );
}

/** The channels that are in use, each with its charger. */
export function useChannelOptions() {
  const chargers = useChargers().data ?? [];
  return chargers
    .filter(({ retired }) => !retired)
    .flatMap(({ name, channels }) => channels.map((one) => ({ value: one.id, label: `${one.name}, ${name}` })));
}

function TypeChoice({ typed, errors, onChange }: FieldsProps) {
  const types = useModuleTypes().data ?? [];
  return (
    <Select
      label="Spares of"
      size="low"
      empty="Choose a module type"
      value={typed.shelfTypeId === '' ? null : typed.shelfTypeId}
      options={types.map(({ id, name }) => ({ value: id, label: name }))}
      onChange={(shelfTypeId) => onChange({ ...typed, shelfTypeId })}
      {...errorOf(errors, 'shelfTypeId')}
    />
  );
}

const NumberField = ({
  typed,
  errors,
  onChange,
  field,
  label,
  unit,
}: FieldsProps & { field: 'amps' | 'lookInMinutes' | 'shelfVolts'; label: string; unit: string }) => (
  <Field
    label={label}
    kind={field === 'lookInMinutes' ? 'whole' : 'decimal'}
    unit={unit}
    size="low"
    value={typed[field]}
    onChangeText={(text) => onChange({ ...typed, [field]: text })}
    {...errorOf(errors, field)}
  />
);
