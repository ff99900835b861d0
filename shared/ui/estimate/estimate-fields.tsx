import { useImperativeHandle, useRef, useState, type Ref } from 'react';
import { View } from 'react-native';
import { Field, type FieldHandle } from '../primitives/field';
import { Link } from '../primitives/link';
import { Select } from '../primitives/select';
import { makeStyles } from '../theme/make-styles';
import { chemistryChoices } from './chemistry-names';
import type { EstimateField, EstimateTyped } from './estimate-typed';

const limits = ['celsius', 'maxVolts', 'maxWatts', 'resistanceMilliohm'] as const;

/** The six numbers, and behind *more* what may be left empty. */
export function EstimateFields({
  typed,
  errors,
  onChange,
  onLeave,
  ref,
}: {
  typed: EstimateTyped;
  errors: Partial<Record<EstimateField, string>>;
  onChange: (change: Partial<EstimateTyped>) => void;
  onLeave: (field: EstimateField) => void;
  /** Goes to a field by its name. */
  ref?: Ref<{ focus: (field: EstimateField) => void }>;
}) {
  const styles = useStyles();
  const handles = useRef<Partial<Record<EstimateField, FieldHandle | null>>>({});
  const [opened, setOpened] = useState(false);
  const more = opened || limits.some((field) => typed[field] !== '');
  useImperativeHandle(ref, () => ({ focus: (field) => handles.current[field]?.focus() }));
  const box = (name: EstimateField, label: string, unit: string, next?: EstimateField, whole = false) => (
    <View style={styles.half}>
      <Field
        ref={(handle) => {
          handles.current[name] = handle;
        }}
        label={label}
        kind={whole ? 'whole' : 'decimal'}
        unit={unit || undefined}
        value={typed[name]}
        error={errors[name]}
        onChangeText={(text) => onChange({ [name]: text })}
        onBlur={() => onLeave(name)}
        nextKey={next ? 'next' : 'done'}
        onSubmit={() => (next ? handles.current[next]?.focus() : handles.current[name]?.blur())}
      />
    </View>
  );
  return (
    <View style={styles.form}>
      <Select
        label="Chemistry"
        size="low"
        value={typed.chemistry}
        options={chemistryChoices}
        onChange={(chemistry) => onChange({ chemistry })}
      />
      <View style={styles.row}>
        {box('spareVolts', 'Spare rests at', 'V', 'targetVolts')}
        {box('targetVolts', 'Pack rests at', 'V', 'ratedAh')}
      </View>
      <View style={styles.row}>
        {box('ratedAh', 'Capacity', 'Ah', 'healthPercent')}
        {box('healthPercent', 'Health', '%', 'groups')}
      </View>
      <View style={styles.row}>
        {box('groups', 'Groups in series', '', 'amps', true)}
        {box('amps', 'Charger gives', 'A')}
      </View>
      {more ? (
        <>
          <View style={styles.row}>
            {box('celsius', 'Module is at', '°C', 'maxVolts')}
            {box('maxVolts', 'Charger volts', 'V', 'maxWatts')}
          </View>
          <View style={styles.row}>
            {box('maxWatts', 'Charger power', 'W', 'resistanceMilliohm')}
            {box('resistanceMilliohm', 'Resistance', 'mΩ')}
          </View>
        </>
      ) : (
        <Link
          kind="small"
          title="more: temperature, limits of the charger"
          onPress={() => setOpened(true)}
          style={styles.more}
        />
      )}
    </View>
  );
}

const useStyles = makeStyles(() => ({
  form: { rowGap: 12 },
  row: { flexDirection: 'row', columnGap: 12 },
  half: { flex: 1, minWidth: 0 },
  more: { marginVertical: -10, alignSelf: 'flex-start' },
}));
