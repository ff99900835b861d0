import { useState } from 'react';
import { View } from 'react-native';
import { readQuantity } from '@/shared/contract/read-quantity';
import type { TakeWorkInput, WorkDto } from '@/shared/contract/work';
import { leastPartMinutes } from '@/shared/contract/work-terms';
import { noTimeSentence } from '../charge/said-at';
import { clock, moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { NBSP } from '../format/marks';
import { parseTimeOfDay } from '../format/parse';
import { dayOf, instantOfDay } from '../format/zone';
import { BottomSheet } from '../primitives/bottom-sheet';
import { Button } from '../primitives/button';
import { ChoiceList } from '../primitives/choice-row';
import { DateTimeField } from '../primitives/date-time-field';
import { Field } from '../primitives/field';
import { SheetFields } from '../primitives/sheet-fields';
import { Txt } from '../primitives/txt';

/** Somebody who can be given work. */
export interface Taker {
  id: string;
  name: string;
  /** Whether they have the skill that is asked for. */
  able: boolean;
}

/** Takes a piece of work for a time, or gives it to somebody. */
export function TakeSheet({
  work,
  takers,
  now,
  busy,
  problem,
  onClose,
  onTake,
}: {
  work: WorkDto;
  /** Null: oneself. */
  takers: readonly Taker[] | null;
  now: number;
  busy: boolean;
  problem: string | null;
  onClose: () => void;
  onTake: (input: TakeWorkInput) => void;
}) {
  const { zone, marks } = useFormats();
  const [when, setWhen] = useState(() => ({ day: dayOf(now, zone), time: clock(now, zone, marks) }));
  const [touched, setTouched] = useState(false);
  const [personId, setPersonId] = useState<string | null>(null);
  const [part, setPart] = useState('');
  const [tried, setTried] = useState(false);
  const time = parseTimeOfDay(when.time);
  const at = time === null ? null : instantOfDay(when.day, time, zone);
  const passed = touched && at !== null && at < now - 60_000;
  const minutes = part.trim() === '' ? null : readQuantity(part, partRule(work.leftLongMinutes));
  const name = takers?.find(({ id }) => id === personId)?.name.split(' ')[0];
  const verb = takers ? (name ? `Give it to ${name}` : 'Choose a person first') : 'Take it';
  const fits = at !== null && !passed && (minutes === null || minutes.ok);
  const send = () => {
    setTried(true);
    if (!fits) return;
    onTake({
      ...(takers && personId ? { personId } : {}),
      // Untouched it is now, however long the sheet has stood open.
      ...(touched && at !== null ? { from: new Date(at).toISOString() } : {}),
      ...(minutes?.ok ? { minutes: minutes.value } : {}),
    });
  };
  return (
    <BottomSheet
      open
      title={takers ? `Give ${work.title}` : `Take ${work.title}`}
      scrimCloses={false}
      onClose={onClose}
      actions={
        <Button
          title={touched && at !== null && !passed ? `${verb} for ${moment(at, zone, now, marks)}` : verb}
          disabled={takers !== null && personId === null}
          busy={busy}
          onPress={send}
        />
      }
    >
      <SheetFields>
        {takers ? (
          <View>
            {takers.length === 0 ? <Txt tone="ink2">Nobody else is in this workshop yet.</Txt> : null}
            <ChoiceList
              label="To whom"
              value={personId}
              choices={takers.map(({ id, name: full, able }) => ({
                value: id,
                title: full,
                disabled: !able,
                meaning: able ? undefined : `has not the skill ${work.skill?.name ?? ''}`,
              }))}
              onChange={setPersonId}
            />
          </View>
        ) : null}
        <DateTimeField
          label="Begins"
          value={when}
          onChange={(value) => {
            setTouched(true);
            setWhen(value);
          }}
          today={dayOf(now, zone)}
          error={tried && at === null ? noTimeSentence : passed ? 'This time has passed. Type a later one.' : undefined}
          hint="as it stands: now"
        />
        {work.splittable && work.leftLongMinutes >= 2 * leastPartMinutes ? (
          <Field
            label="How much of it"
            kind="whole"
            unit="min"
            value={part}
            onChangeText={setPart}
            hint={`left empty: all that is left, ${work.leftLongMinutes}${NBSP}min`}
            error={tried && minutes && !minutes.ok ? minutes.message : undefined}
          />
        ) : null}
        {problem ? (
          <Txt tone="alarm" bold role="alert">
            {problem}
          </Txt>
        ) : null}
      </SheetFields>
    </BottomSheet>
  );
}

const partRule = (most: number) =>
  ({ name: 'The part', unit: 'min', min: leastPartMinutes, max: most, whole: true }) as const;
