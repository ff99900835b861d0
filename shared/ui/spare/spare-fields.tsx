import type { ReactNode } from 'react';
import type { FieldPath, FieldValues, UseFormReturn } from 'react-hook-form';
import { View } from 'react-native';
import type { ModuleTypeDto } from '@/shared/contract/equipment';
import { useFormats } from '../format/formats';
import { ampHours } from '../format/quantities';
import { FieldPair } from '../auth/form-stack';
import { Field } from '../primitives/field';
import { Select } from '../primitives/select';
import { TypedField } from './typed-field';
import { conditionWords, sourceWords } from './spare-words';

/** What a new or a changed spare is: label, type, place, capacity, condition, note. */
export function SpareFields<Values extends FieldValues>({
  form,
  types,
  type,
  onType,
  scan,
}: {
  form: UseFormReturn<Values, unknown, Values>;
  types: readonly ModuleTypeDto[];
  type: ModuleTypeDto | undefined;
  onType?: (type: ModuleTypeDto) => void;
  /** Scans the label into its field. */
  scan?: ReactNode;
}) {
  const { marks } = useFormats();
  const at = (name: string) => name as FieldPath<Values>;
  const usual = type ? `Empty: a guess of ${ampHours(type.ratedAh * 0.92, marks)}.` : undefined;
  return (
    <View style={{ rowGap: 12 }}>
      <FieldPair>
        <TypedField form={form} name={at('label')}>
          {(field) => <Field label="Label" kind="label" required maxLength={30} {...field} />}
        </TypedField>
        <TypedField form={form} name={at('shelfPlace')}>
          {(field) => <Field label="Shelf place" kind="label" maxLength={30} {...field} />}
        </TypedField>
      </FieldPair>
      {scan}
      <TypedField form={form} name={at('moduleTypeId')} missing="Choose the type.">
        {({ value, onChange, onBlur, ref, error }) => (
          <Select
            ref={ref}
            label="Type"
            required
            empty="Choose a type"
            value={value || null}
            error={error}
            onBlur={onBlur}
            options={types.map((each) => ({ value: each.id, label: each.name }))}
            onChange={(id) => {
              onChange(id);
              const chosen = types.find((each) => each.id === id);
              if (chosen) onType?.(chosen);
            }}
          />
        )}
      </TypedField>
      <FieldPair>
        <TypedField form={form} name={at('capacityAh')}>
          {(field) => <Field label="Capacity of a group" kind="decimal" unit="Ah" hint={usual} {...field} />}
        </TypedField>
        <TypedField form={form} name={at('healthPercent')}>
          {(field) => <Field label="or its health" kind="decimal" unit="%" {...field} />}
        </TypedField>
      </FieldPair>
      <FieldPair>
        <TypedField form={form} name={at('capacitySource')}>
          {({ value, onChange, onBlur, ref, error }) => (
            <Select
              ref={ref}
              label="Known from"
              value={value}
              error={error}
              onBlur={onBlur}
              onChange={onChange}
              options={[
                { value: 'measured', label: 'a measurement' },
                { value: 'label', label: sourceWords.label.replace('off the', 'the') },
                { value: 'guessed', label: 'a guess' },
              ]}
            />
          )}
        </TypedField>
        <TypedField form={form} name={at('condition')} missing="Choose what was seen.">
          {({ value, onChange, onBlur, ref, error }) => (
            <Select
              ref={ref}
              label="Condition"
              required
              empty="Look at it first"
              value={value || null}
              error={error}
              onBlur={onBlur}
              onChange={onChange}
              options={Object.entries(conditionWords).map(([code, label]) => ({ value: code, label }))}
            />
          )}
        </TypedField>
      </FieldPair>
      <TypedField form={form} name={at('note')}>
        {(field) => <Field label="Note" multiline lines={2} maxLength={500} {...field} />}
      </TypedField>
    </View>
  );
}
