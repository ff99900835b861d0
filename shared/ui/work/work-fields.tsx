import { useController, useWatch } from 'react-hook-form';
import { View } from 'react-native';
import type { PlaceDto, SkillDto } from '@/shared/contract/staffing';
import { fieldSentence } from '@/shared/contract/field-sentence';
import { leastPartMinutes, workPriorities, workPriorityNames, type WorkPriority } from '@/shared/contract/work-terms';
import { daysBetween } from '../format/zone';
import { BoundCheck, BoundField, BoundSelect, type TypedForm } from '../forms/bound';
import { DateTimeField } from '../primitives/date-time-field';
import { Link } from '../primitives/link';
import { SegmentSwitch } from '../primitives/segment-switch';
import { Txt } from '../primitives/txt';
import { foldedWords, workNames, type WorkNamed, type WorkTyped } from './work-form';

export interface WorkChoices {
  skills: readonly SkillDto[];
  places: readonly PlaceDto[];
  repairs: readonly { id: string; label: string }[];
}

type WorkFormOf = TypedForm<WorkTyped>;

/** Title and minutes; the rest is folded away until it is asked for. */
export function WorkFields({
  form,
  choices,
  named,
  today,
  unfolded,
  onUnfold,
}: {
  form: WorkFormOf;
  choices: WorkChoices;
  named: WorkNamed;
  /** 'YYYY-MM-DD' in the workshop's zone. */
  today: string;
  unfolded: boolean;
  onUnfold: () => void;
}) {
  return (
    <View style={{ rowGap: 16 }}>
      <BoundField
        form={form}
        name="title"
        label={workNames.title}
        hint="short, as people call it: brake bleed"
        required
        nextKey="next"
      />
      <BoundField
        form={form}
        name="likelyMinutes"
        label={workNames.likelyMinutes}
        kind="whole"
        unit="min"
        required
        hint="what it usually takes"
      />
      {unfolded ? (
        <Unfolded form={form} choices={choices} today={today} />
      ) : (
        <Folded form={form} named={named} onUnfold={onUnfold} />
      )}
    </View>
  );
}

function Folded({ form, named, onUnfold }: { form: WorkFormOf; named: WorkNamed; onUnfold: () => void }) {
  const typed = useWatch({ control: form.control }) as WorkTyped;
  return (
    <View>
      <Txt kind="small" tone="ink2">
        {`As it stands: ${foldedWords(typed, named)}.`}
      </Txt>
      <Link title="Place, skill, due time and more" onPress={onUnfold} />
    </View>
  );
}

function Unfolded({ form, choices, today }: { form: WorkFormOf; choices: WorkChoices; today: string }) {
  const priority = useController({ control: form.control, name: 'priority' }).field;
  return (
    <>
      <BoundField
        form={form}
        name="longMinutes"
        label={workNames.longMinutes}
        kind="whole"
        unit="min"
        hint="it has to fit a wait with this; left empty: half as long again"
        nextKey="next"
      />
      <BoundSelect
        form={form}
        name="repairId"
        label={workNames.repair}
        options={[
          { value: '', label: 'For no repair' },
          ...choices.repairs.map(({ id, label }) => ({ value: id, label })),
        ]}
      />
      <BoundSelect
        form={form}
        name="placeId"
        label={workNames.place}
        options={[
          { value: '', label: 'Any place' },
          ...choices.places.map(({ id, name }) => ({ value: id, label: name })),
        ]}
      />
      <BoundSelect
        form={form}
        name="skillId"
        label={workNames.skill}
        options={[
          { value: '', label: 'Everybody can do it' },
          ...choices.skills.map(({ id, name }) => ({ value: id, label: name })),
        ]}
      />
      <View>
        <Txt kind="label" style={{ marginBottom: 4 }}>
          {workNames.priority}
        </Txt>
        <SegmentSwitch<WorkPriority>
          label={workNames.priority}
          value={priority.value}
          segments={workPriorities.map((value) => ({ value, label: workPriorityNames[value] }))}
          onChange={priority.onChange}
        />
      </View>
      <Due form={form} today={today} />
      <BoundCheck
        form={form}
        name="splittable"
        title={workNames.splittable}
        meaning={`In stretches of at least ${leastPartMinutes} min, by one person or several.`}
      />
      <BoundField form={form} name="note" label={workNames.note} multiline lines={3} />
    </>
  );
}

function Due({ form, today }: { form: WorkFormOf; today: string }) {
  const { field, fieldState } = useController({ control: form.control, name: 'dueAt' });
  const off = daysBetween(today, field.value.day);
  return (
    <DateTimeField
      label={workNames.due}
      value={field.value}
      onChange={field.onChange}
      onBlur={field.onBlur}
      today={today}
      from={Math.min(0, off)}
      to={Math.max(30, off)}
      hint="left empty: whenever"
      error={fieldState.error ? fieldSentence(fieldState.error.message) : undefined}
    />
  );
}
