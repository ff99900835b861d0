import type { Ref } from 'react';
import { useController, useWatch, type FieldPath, type FieldValues, type UseFormReturn } from 'react-hook-form';
import { View } from 'react-native';
import type { MeterDto } from '@/shared/contract/equipment';
import { groupVoltsProblem, type TypeWindow } from '@/shared/contract/group-volts';
import { readQuantity, type QuantityRule } from '@/shared/contract/read-quantity';
import { FieldPair } from '../auth/form-stack';
import { useFormats } from '../format/formats';
import { parseNumber, typedDecimals } from '../format/parse';
import { clipVolts, millivolts } from '../format/quantities';
import { Caution } from '../primitives/call-out';
import { Field, type FieldHandle } from '../primitives/field';
import { Select } from '../primitives/select';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { TypedField } from './typed-field';

const notKnown = 'none';
const voltsRule: QuantityRule = { name: 'The voltage', unit: 'V', min: 0 };

/** Group voltages at rest with the meter and the temperature they were read at. The Next key walks the groups. */
export function ReadingFields<Values extends FieldValues>({
  form,
  prefix = '',
  groups,
  type,
  meters,
}: {
  form: UseFormReturn<Values, unknown, Values>;
  /** Where the reading stands inside another form: 'reading.'. */
  prefix?: string;
  groups: number;
  /** The module's limits: each voltage is judged by them as its field is left. */
  type: TypeWindow & { floorVolts: number };
  meters: readonly MeterDto[];
}) {
  const styles = useStyles();
  const { marks } = useFormats();
  const { floorVolts } = type;
  const at = (name: string) => `${prefix}${name}` as FieldPath<Values>;
  const typed = ((useWatch({ control: form.control, name: at('groupVolts') }) ?? []) as string[]).slice(0, groups);
  const read = typed.map((text) => parseNumber(text ?? ''));
  const volts = read.flatMap((one) => (one.ok ? [one.value] : []));
  const whole =
    volts.length === groups && groups > 0 && volts.every((value) => groupVoltsProblem(value, type) === null);
  const under = read.flatMap((one, index) => (one.ok && one.value > 0 && one.value < floorVolts ? [index] : []));
  const rough =
    whole && typed.some((text) => typedDecimals(text) < 3 && !/mv/i.test(text) && (parseOr(text) ?? 0) < 100);
  const countError = form.getFieldState(at('groupVolts'), form.formState).error as { message?: string } | undefined;
  return (
    <View style={{ rowGap: 12 }}>
      <View style={styles.grid}>
        {Array.from({ length: groups }, (_, index) => (
          <View key={index} style={styles.cell}>
            <TypedField
              form={form}
              name={at(`groupVolts.${index}`)}
              missing={`G${index + 1} is missing.`}
              judge={(text) => {
                const one = readQuantity(text, voltsRule);
                return one.ok ? groupVoltsProblem(one.value, type) : null;
              }}
            >
              {(field) => (
                <Field
                  label={`G${index + 1}`}
                  kind="decimal"
                  unit="V"
                  required
                  nextKey={index + 1 < groups ? 'next' : 'done'}
                  onSubmit={() =>
                    index + 1 < groups ? form.setFocus(at(`groupVolts.${index + 1}`)) : form.setFocus(at('celsius'))
                  }
                  {...field}
                />
              )}
            </TypedField>
          </View>
        ))}
      </View>
      {countError?.message ? (
        <Txt kind="label" tone="alarm" role="alert">
          {countError.message}
        </Txt>
      ) : null}
      {whole ? (
        <Txt kind="small" tone="ink2" aria-live="polite">
          {`${millivolts(Math.max(...volts) - Math.min(...volts))} apart.${rough ? ' Two decimals are not enough to judge 5 mV. Type three where the meter shows them.' : ''}`}
        </Txt>
      ) : null}
      {under.length > 0 ? (
        <Caution>{`${under.map((index) => `G${index + 1}`).join(', ')} under the floor of ${clipVolts(floorVolts, marks)}. Keep the reading; the module is not charged here.`}</Caution>
      ) : null}
      <FieldPair>
        <TypedField form={form} name={at('celsius')}>
          {(field) => <Field label="Module is at" kind="decimal" unit="°C" {...field} />}
        </TypedField>
        <ReadWith form={form} name={at('meterId')} meters={meters} />
      </FieldPair>
    </View>
  );
}

/** The meter: named, or said to be not known. Nothing stands there till one of them is chosen. */
function ReadWith<Values extends FieldValues>({
  form,
  name,
  meters,
}: {
  form: UseFormReturn<Values, unknown, Values>;
  name: FieldPath<Values>;
  meters: readonly MeterDto[];
}) {
  const {
    field: { ref, value: typed, onChange, onBlur },
    fieldState,
  } = useController({ control: form.control, name });
  const value = typed as string | null;
  return (
    <Select
      ref={ref as Ref<FieldHandle>}
      label="Read with"
      empty="Choose the meter"
      required
      error={fieldState.error && (value === '' ? 'Choose the meter, or not known.' : fieldState.error.message)}
      onBlur={onBlur}
      value={value === null ? notKnown : value || null}
      onChange={(id) => onChange(id === notKnown ? null : id)}
      options={[
        ...meters.map((meter) => ({ value: meter.id, label: meter.name })),
        { value: notKnown, label: 'not known' },
      ]}
    />
  );
}

const parseOr = (text: string): number | null => {
  const read = parseNumber(text);
  return read.ok ? read.value : null;
};

const useStyles = makeStyles(() => ({
  grid: { flexDirection: 'row', flexWrap: 'wrap', gap: 12 },
  // Two beside each other on the phone, more where there is room.
  cell: { flexGrow: 1, flexBasis: 150, minWidth: 0 },
}));
