import { useWatch, type FieldPath, type FieldValues, type PathValue } from 'react-hook-form';
import { View } from 'react-native';
import type { ModuleTypeDto } from '@/shared/contract/equipment';
import { USUAL_AIM_MILLIVOLTS } from '@/shared/contract/pack';
import { BoundField, BoundSelect, type TypedForm } from '../forms/bound';
import { Txt } from '../primitives/txt';
import { mapHint, type PackTyped } from './pack-form';

/** The numbers of a pack: module type, groups, groups per module, where the groups sit, and what it balances with. */
export function PackFields<V extends FieldValues & { pack: PackTyped }>({
  form,
  types,
  readOnly = false,
  fixedCount = false,
}: {
  form: TypedForm<V>;
  types: readonly ModuleTypeDto[];
  readOnly?: boolean;
  /** A reading stands: the number of groups cannot change any more. */
  fixedCount?: boolean;
}) {
  const at = (name: keyof PackTyped) => `pack.${name}` as FieldPath<V>;
  const pack = useWatch({ control: form.control as never, name: 'pack' as never }) as PackTyped;
  const type = types.find(({ id }) => id === pack.moduleTypeId);
  const fill = type && pack.groupsPerModule.trim() === '' ? String(type.groupsInSeries) : null;
  return (
    <View style={{ rowGap: 16 }}>
      <BoundSelect
        form={form}
        name={at('moduleTypeId')}
        label="Module type"
        readOnly={readOnly}
        hint="Its curve gives the ampere-hours of a reading, and its spares are the candidates."
        options={[
          { value: '', label: 'Not known' },
          ...types.map(({ id, name, groupsInSeries }) => ({ value: id, label: `${name}, ${groupsInSeries} groups` })),
        ]}
      />
      <BoundField
        form={form}
        name={at('groupCount')}
        label="Groups"
        kind="whole"
        required
        readOnly={readOnly || fixedCount}
        hint={fixedCount ? 'A reading stands: the number of groups stays.' : 'of the whole pack, 1 to 400'}
        nextKey="next"
      />
      <BoundField
        form={form}
        name={at('groupsPerModule')}
        label="Groups per module"
        kind="whole"
        required
        readOnly={readOnly}
        hint={fill ? `${type?.name} has ${fill}` : undefined}
        nextKey="next"
        onLeave={() => {
          if (fill) form.setValue(at('groupsPerModule'), fill as PathValue<V, FieldPath<V>>);
        }}
      />
      <BoundField
        form={form}
        name={at('positionOfGroup')}
        label="Module of each group"
        multiline
        lines={3}
        readOnly={readOnly}
        hint="Left empty: 1, 1, 2, 2, … in order. Else one position for each group, with commas."
      />
      {mapHint(pack) ? (
        <Txt kind="small" tone="ink2">
          {mapHint(pack)}
        </Txt>
      ) : null}
      <BoundField
        form={form}
        name={at('bleedAmps')}
        label="Bleed current"
        kind="decimal"
        unit="A"
        readOnly={readOnly}
        hint="of the pack’s own balancing; left empty: the usual 0.1 to 0.2 A"
        nextKey="next"
      />
      <BoundField
        form={form}
        name={at('aimMillivolts')}
        label="Aim after the fit"
        kind="whole"
        unit="mV"
        readOnly={readOnly}
        hint={`the spread that proves a repair; left empty: ${USUAL_AIM_MILLIVOLTS} mV`}
        nextKey="next"
      />
    </View>
  );
}
