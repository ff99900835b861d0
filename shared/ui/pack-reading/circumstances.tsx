import { View } from 'react-native';
import { readingStages, type ReadingStage } from '@/shared/contract/pack-reading';
import { FieldPair } from '../auth/form-stack';
import { Field } from '../primitives/field';
import { Select } from '../primitives/select';
import { stageNames, type ReadingTyped } from './reading-typed';

const own = 'own';

/** When and with what a pack was read: its stage, voltage, temperature, rest, and the instrument. */
export function Circumstances({
  typed,
  meters,
  errors,
  onChange,
}: {
  typed: ReadingTyped;
  meters: readonly { id: string; name: string }[];
  /** Sentences by field. */
  errors: Readonly<Record<string, string>>;
  onChange: (change: Partial<ReadingTyped>) => void;
}) {
  return (
    <View style={{ rowGap: 12 }}>
      <Select<ReadingStage>
        label="Read at"
        value={typed.stage}
        options={readingStages.map((value) => ({ value, label: stageNames[value] }))}
        onChange={(stage) => onChange({ stage })}
        error={errors.stage}
      />
      {typed.stage === 'after-balance' ? (
        <Field
          label="Balance charge"
          kind="whole"
          value={typed.balanceCount}
          onChangeText={(balanceCount) => onChange({ balanceCount })}
          error={errors.balanceCount}
        />
      ) : null}
      <FieldPair>
        <Field
          label="Pack voltage"
          kind="decimal"
          unit="V"
          value={typed.packVolts}
          onChangeText={(packVolts) => onChange({ packVolts })}
          error={errors.packVolts}
        />
        <Field
          label="Pack is at"
          kind="decimal"
          unit="°C"
          value={typed.celsius}
          onChangeText={(celsius) => onChange({ celsius })}
          error={errors.celsius}
        />
      </FieldPair>
      <Field
        label="Time since load"
        hint="a short rest widens what the target is worth"
        kind="decimal"
        unit="min"
        value={typed.restedMinutes}
        onChangeText={(restedMinutes) => onChange({ restedMinutes })}
        error={errors.restedMinutes}
      />
      <Select
        label="Read with"
        value={typed.meterId || own}
        options={[
          { value: own, label: 'the pack’s own instrument' },
          ...meters.map(({ id, name }) => ({ value: id, label: name })),
        ]}
        onChange={(id) => onChange({ meterId: id === own ? '' : id })}
        error={errors.meterId}
      />
      {typed.meterId === '' ? (
        <Field
          label="Instrument"
          hint="its name, where the workshop has several"
          value={typed.instrument}
          maxLength={60}
          onChangeText={(instrument) => onChange({ instrument })}
          error={errors.instrument}
        />
      ) : null}
      <Field label="Note" value={typed.note} onChangeText={(note) => onChange({ note })} error={errors.note} />
    </View>
  );
}
