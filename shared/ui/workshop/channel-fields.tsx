import { useController, useWatch } from 'react-hook-form';
import { View } from 'react-native';
import type { ChannelDto } from '@/shared/contract/equipment';
import { Link } from '../primitives/link';
import { SegmentSwitch } from '../primitives/segment-switch';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { BoundCheck, BoundField, type TypedForm } from '../forms/bound';
import { channelFieldNames as names, senseNames, type ChannelTexts, type ChargerTexts } from './charger-form';
import { FieldGrid } from './field-grid';

/** One channel of a charger, all of it. */
export function ChannelFields({
  form,
  index,
  held,
  readOnly,
  onRemove,
}: {
  form: TypedForm<ChargerTexts>;
  index: number;
  /** The charge that has it now. */
  held: ChannelDto['heldBy'];
  readOnly: boolean;
  /** Left out where it is the only channel. */
  onRemove?: () => void;
}) {
  const styles = useStyles();
  const at = <K extends keyof ChannelTexts>(key: K) => `channels.${index}.${key}` as const;
  const [name, canDischarge] = useWatch({ control: form.control, name: [at('name'), at('canDischarge')] });
  const senses = useController({ control: form.control, name: at('senses') });
  const title = name.trim() === '' ? `Channel ${index + 1}` : `Channel ${name}`;
  const number = (key: Exclude<keyof ChannelTexts, 'id' | 'senses'>, unit: string, hint?: string) => (
    <BoundField
      form={form}
      name={at(key)}
      label={names[key]}
      kind="decimal"
      unit={unit}
      hint={hint}
      readOnly={readOnly}
      nextKey="next"
    />
  );
  return (
    <View role="group" aria-label={title} style={styles.channel}>
      <View style={styles.head}>
        <Txt kind="heading" heading={3}>
          {title}
        </Txt>
        {onRemove && !readOnly ? (
          <Link
            kind="small"
            align="right"
            title="take out of service"
            label={`Take ${title} out of service`}
            onPress={onRemove}
          />
        ) : null}
      </View>
      {held ? (
        <Txt kind="small" tone="ink2">
          {`${held.title} has it now and goes on with the numbers it was planned with.`}
        </Txt>
      ) : null}
      <FieldGrid>
        <BoundField form={form} name={at('name')} label={names.name} kind="label" readOnly={readOnly} nextKey="next" />
        {number('maxAmps', 'A', 'the most it gives')}
        {number('minAmps', 'A', 'the least it can be set to')}
        {number('maxVolts', 'V', 'at its terminals')}
        {number('maxWatts', 'W', 'empty: no limit of its own')}
        {number('leadMilliohm', 'mΩ', 'both leads together')}
        {number('displayStepMillivolts', 'mV', 'last digit of its voltmeter')}
        {number('displayStepAmps', 'A', 'its amps are set in these')}
        {number('dutyPercent', '%', 'of the time; empty: all')}
        {number('deratingAboveCelsius', '°C', 'in the room; empty: never')}
        {number('deratingPercent', '%', 'of its current')}
      </FieldGrid>
      <View style={styles.senses}>
        <Txt kind="label">{names.senses}</Txt>
        {readOnly ? (
          <Txt>{senseNames[senses.field.value]}</Txt>
        ) : (
          <SegmentSwitch
            label={`${title} senses at`}
            value={senses.field.value}
            segments={[
              { value: 'own-terminals', label: 'Its own terminals' },
              { value: 'module', label: 'The module' },
            ]}
            onChange={senses.field.onChange}
          />
        )}
      </View>
      <View>
        <BoundCheck
          form={form}
          name={at('leadsMeasured')}
          title={names.leadsMeasured}
          meaning="Else they are a guess, and the band is wider until readings tell."
          readOnly={readOnly}
        />
        <BoundCheck form={form} name={at('adjustableVolts')} title={names.adjustableVolts} readOnly={readOnly} />
        <BoundCheck
          form={form}
          name={at('singleGroup')}
          title={names.singleGroup}
          meaning="Low enough in voltage, and set finely enough, for one group alone."
          readOnly={readOnly}
        />
        <BoundCheck form={form} name={at('canDischarge')} title={names.canDischarge} readOnly={readOnly} />
      </View>
      {canDischarge ? (
        <FieldGrid two>
          {number('dischargeAmps', 'A', 'where it holds a current')}
          {number('loadOhm', 'Ω', 'where it is a resistor')}
        </FieldGrid>
      ) : null}
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  channel: { rowGap: 12, borderTopWidth: 1.5, borderTopColor: colors.line, paddingTop: 12 },
  head: { flexDirection: 'row', alignItems: 'center', justifyContent: 'space-between', columnGap: 12, minHeight: 36 },
  senses: { rowGap: 5, maxWidth: 420 },
}));
