import { useState, type ReactNode } from 'react';
import { View } from 'react-native';
import type { ChemistryId } from '@/calc/plan-types';
import type { MeterDto } from '@/shared/contract/equipment';
import type { SpareDto } from '@/shared/contract/spare';
import { DateTimeField } from '../primitives/date-time-field';
import { Field } from '../primitives/field';
import { Link } from '../primitives/link';
import { SegmentSwitch } from '../primitives/segment-switch';
import { Select } from '../primitives/select';
import { makeStyles } from '../theme/make-styles';
import { flatChemistries, isBySoc, type PlanField, type PlanTyped } from './plan-typed';
import { SpareChoice } from './spare-choice';

/** From spare to pack: everything a plan is made of, typed. */
export function PlanFields({
  typed,
  errors,
  spares,
  meters,
  today,
  toleranceHint,
  chemistry,
  scan,
  onChange,
  onLeave,
}: {
  typed: PlanTyped;
  /** Only of fields that were left, or all after *Checks before clipping on* was tried. */
  errors: Partial<Record<PlanField, string>>;
  spares: readonly SpareDto[] | undefined;
  meters: readonly MeterDto[] | undefined;
  today: string;
  toleranceHint: string;
  /** Of the chosen spare; null while it is not known. */
  chemistry: ChemistryId | null;
  /** Scans the label of the spare. */
  scan?: ReactNode;
  onChange: (change: Partial<PlanTyped>) => void;
  onLeave: (field: PlanField) => void;
}) {
  const styles = useStyles();
  const field = (name: PlanField) => ({
    value: typed[name],
    error: errors[name],
    onChangeText: (text: string) => onChange({ [name]: text }),
    onBlur: () => onLeave(name),
  });
  const [opened, setOpened] = useState(false);
  const more =
    opened ||
    (['toleranceMillivolts', 'packCelsius', 'clipTime'] as const).some(
      (name) => typed[name] !== '' || errors[name] !== undefined,
    );
  const flat = chemistry !== null && flatChemistries.includes(chemistry);
  const bySoc = isBySoc(typed, chemistry);
  return (
    <View style={styles.form}>
      <SpareChoice
        spares={spares}
        spareId={typed.spareId}
        error={errors.spareId}
        onChange={(spareId) => onChange({ spareId })}
        onLeave={() => onLeave('spareId')}
      />
      {scan}
      {flat ? (
        <SegmentSwitch
          label="The pack is told by"
          value={bySoc ? 'soc' : 'volts'}
          segments={[
            { value: 'volts', label: 'Volts' },
            { value: 'soc', label: 'State of charge' },
          ]}
          onChange={(targetBy) => onChange({ targetBy })}
        />
      ) : null}
      <View style={styles.row}>
        <View style={styles.half}>
          {bySoc ? (
            <Field
              label="Pack stands at"
              kind="decimal"
              unit="%"
              hint="by its own counter"
              required
              {...field('targetSoc')}
            />
          ) : (
            <Field label="Pack rests at" kind="decimal" unit="V" required {...field('targetVolts')} />
          )}
        </View>
        {bySoc ? null : (
          <View style={styles.half}>
            <Select
              label="Read with"
              value={typed.meterId || 'none'}
              error={errors.meterId}
              options={[
                { value: 'none', label: 'not known' },
                ...(meters ?? []).map((meter) => ({ value: meter.id, label: meter.name })),
              ]}
              onChange={(meterId) => onChange({ meterId: meterId === 'none' ? '' : meterId })}
            />
          </View>
        )}
      </View>
      <DateTimeField
        label="Ready by"
        value={{ day: typed.readyDay || today, time: typed.readyTime }}
        onChange={({ day, time }) => onChange({ readyDay: day, readyTime: time })}
        onBlur={() => onLeave('readyTime')}
        today={today}
        error={errors.readyTime}
      />
      <View style={styles.row}>
        <View style={styles.half}>
          <Field label="Repair" kind="label" maxLength={30} {...field('repairRef')} />
        </View>
        <View style={styles.half}>
          <Field label="Module" kind="label" maxLength={30} {...field('modulePosition')} />
        </View>
      </View>
      {more ? (
        <>
          <DateTimeField
            label="Clip on"
            value={{ day: typed.clipDay || today, time: typed.clipTime }}
            onChange={({ day, time }) => onChange({ clipDay: day, clipTime: time })}
            onBlur={() => onLeave('clipTime')}
            today={today}
            hint="empty: now"
            error={errors.clipTime}
          />
          <View style={styles.row}>
            <View style={styles.half}>
              <Field
                label="Tolerance"
                kind="decimal"
                unit="mV"
                placeholder={toleranceHint}
                {...field('toleranceMillivolts')}
              />
            </View>
            <View style={styles.half}>
              <Field label="Pack was at" kind="decimal" unit="°C" {...field('packCelsius')} />
            </View>
          </View>
        </>
      ) : (
        <Link
          kind="small"
          title="more: clip on later, tolerance, temperature"
          onPress={() => setOpened(true)}
          style={styles.more}
        />
      )}
    </View>
  );
}

const useStyles = makeStyles(() => ({
  form: { rowGap: 14 },
  row: { flexDirection: 'row', columnGap: 12 },
  half: { flex: 1, minWidth: 0 },
  more: { marginVertical: -10, alignSelf: 'flex-start' },
}));
