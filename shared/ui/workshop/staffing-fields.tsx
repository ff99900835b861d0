import { useController, useFieldArray } from 'react-hook-form';
import { View } from 'react-native';
import type { SkillDto } from '@/shared/contract/staffing';
import type { DayHours } from '@/shared/contract/workshop';
import { BoundField, useBound, type TypedForm } from '../forms/bound';
import { BoundTime } from '../forms/bound-time';
import { Button } from '../primitives/button';
import { CheckBox } from '../primitives/check-box';
import { ChoiceList } from '../primitives/choice-row';
import { Link } from '../primitives/link';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { DayField } from './day-field';
import { FieldGrid, FormPart } from './field-grid';
import { HoursFields } from './hours-fields';
import { hoursWords, type StaffingTexts } from './staffing-form';

type StaffingFormOf = TypedForm<StaffingTexts>;

/** When a person is there, when not, and what they can do. */
export function StaffingFields({
  form,
  workshopHours,
  skills,
  onAddSkill,
}: {
  form: StaffingFormOf;
  workshopHours: readonly DayHours[];
  skills: readonly SkillDto[];
  /** The way to the workshop's list of skills; null: not for this person. */
  onAddSkill: (() => void) | null;
}) {
  const own = useController({ control: form.control, name: 'ownHours' }).field;
  return (
    <>
      <FormPart title="Working hours" note="When the bench plan may count on them.">
        <ChoiceList
          label="Whose hours"
          value={own.value ? 'own' : 'workshop'}
          outset={0}
          choices={[
            { value: 'workshop', title: 'The workshop’s hours', meaning: hoursWords(workshopHours) },
            { value: 'own', title: 'Own hours', meaning: 'other days, other times, part of a week' },
          ]}
          onChange={(chosen) => own.onChange(chosen === 'own')}
        />
        {own.value ? <HoursFields form={form} name="hours" off="not there" /> : null}
      </FormPart>
      <Breaks form={form} />
      <DaysOff form={form} />
      <Skills form={form} skills={skills} onAdd={onAddSkill} />
    </>
  );
}

function Breaks({ form }: { form: StaffingFormOf }) {
  const styles = useStyles();
  const list = useFieldArray({ control: form.control, name: 'breaks', keyName: 'key' });
  return (
    <FormPart title="Breaks" note="Every working day. Nothing is planned in them.">
      {list.fields.map(({ key }, index) => (
        <View key={key} role="group" aria-label={`Break ${index + 1}`} style={styles.entry}>
          <View style={styles.fields}>
            <FieldGrid two>
              <BoundTime form={form} name={`breaks.${index}.from`} label="From" />
              <BoundTime form={form} name={`breaks.${index}.to`} label="To" />
            </FieldGrid>
          </View>
          <Link
            kind="small"
            title="remove"
            label={`Remove break ${index + 1}`}
            align="right"
            onPress={() => list.remove(index)}
          />
        </View>
      ))}
      <Button
        look="line"
        size="small"
        icon="plus"
        title="Add a break"
        onPress={() =>
          list.append(list.fields.length === 0 ? { from: '12:00', to: '12:30' } : { from: '', to: '' }, {
            shouldFocus: false,
          })
        }
      />
    </FormPart>
  );
}

function DaysOff({ form }: { form: StaffingFormOf }) {
  const styles = useStyles();
  const list = useFieldArray({ control: form.control, name: 'daysOff', keyName: 'key' });
  return (
    <FormPart title="Days off" note="Whole days: leave, training, sick.">
      {list.fields.map(({ key }, index) => (
        <View key={key} role="group" aria-label={`Days off ${index + 1}`} style={styles.entry}>
          <View style={[styles.fields, styles.stack]}>
            <FieldGrid two>
              <BoundDate form={form} name={`daysOff.${index}.from`} label="First day" />
              <BoundDate form={form} name={`daysOff.${index}.to`} label="Last day" hint="left empty: one day" />
            </FieldGrid>
            <BoundField form={form} name={`daysOff.${index}.note`} label="Note" hint="may stay empty" />
          </View>
          <Link
            kind="small"
            title="remove"
            label={`Remove days off ${index + 1}`}
            align="right"
            onPress={() => list.remove(index)}
          />
        </View>
      ))}
      <Button
        look="line"
        size="small"
        icon="plus"
        title="Add days off"
        onPress={() => list.append({ from: '', to: '', note: '' }, { shouldFocus: false })}
      />
    </FormPart>
  );
}

function BoundDate({
  form,
  name,
  label,
  hint,
}: {
  form: StaffingFormOf;
  name: `daysOff.${number}.from` | `daysOff.${number}.to`;
  label: string;
  hint?: string;
}) {
  const { value, ...bound } = useBound({ form, name });
  return <DayField {...bound} label={label} hint={hint} value={String(value ?? '')} />;
}

function Skills({
  form,
  skills,
  onAdd,
}: {
  form: StaffingFormOf;
  skills: readonly SkillDto[];
  onAdd: (() => void) | null;
}) {
  const { field, fieldState } = useController({ control: form.control, name: 'skillIds' });
  const chosen = field.value;
  return (
    <FormPart title="Skills" note="Work that asks for a skill is offered to those who have it.">
      <View>
        {skills.map(({ id, name: skill }) => (
          <CheckBox
            key={id}
            checked={chosen.includes(id)}
            title={skill}
            onChange={(on) => field.onChange(on ? [...chosen, id] : chosen.filter((one) => one !== id))}
          />
        ))}
        {skills.length === 0 ? (
          <Txt tone="ink2">The workshop’s list of skills is empty. Work asks for none until there are some.</Txt>
        ) : null}
        {onAdd ? <Link kind="small" title="add a skill to the list" onPress={onAdd} /> : null}
      </View>
      {fieldState.error ? (
        <Txt kind="small" tone="alarm" bold>
          {fieldState.error.message}
        </Txt>
      ) : null}
    </FormPart>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  entry: {
    flexDirection: 'row',
    alignItems: 'flex-end',
    columnGap: 12,
    borderTopWidth: 1,
    borderTopColor: colors.line,
    paddingTop: 10,
  },
  fields: { flex: 1, minWidth: 0 },
  stack: { rowGap: 12 },
}));
