import { useState } from 'react';
import { View } from 'react-native';
import type { ChargeDto } from '@/shared/contract/charge';
import { clock, moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { parseTimeOfDay } from '../format/parse';
import { dayOf, instantOfDay } from '../format/zone';
import { BottomSheet } from '../primitives/bottom-sheet';
import { Button } from '../primitives/button';
import { DateTimeField } from '../primitives/date-time-field';
import { Txt } from '../primitives/txt';
import { channelsOf } from './card-model';
import { noTimeSentence } from './said-at';

/** Queues a charge for a clip-on time, or gives it another one. */
export function ClipOnSheet({
  charge,
  now,
  busy,
  problem,
  onClose,
  onConfirm,
}: {
  charge: ChargeDto;
  now: number;
  busy: boolean;
  problem: string | null;
  onClose: () => void;
  /** Epoch ms. */
  onConfirm: (at: number) => void;
}) {
  const { zone, marks } = useFormats();
  const [value, setValue] = useState(() => {
    const at = Math.max(now, Date.parse(charge.clipOnAt));
    return { day: dayOf(at, zone), time: clock(at, zone, marks) };
  });
  const [tried, setTried] = useState(false);
  const minutes = parseTimeOfDay(value.time);
  const at = minutes === null ? null : instantOfDay(value.day, minutes, zone);
  const passed = at !== null && at < now - 60_000;
  const error =
    minutes === null ? noTimeSentence : passed ? 'This time has passed. Type a later one.' : (problem ?? undefined);
  const confirm = () => {
    setTried(true);
    if (at !== null && !passed) onConfirm(at);
  };
  return (
    <BottomSheet
      open
      onClose={onClose}
      title={charge.stage === 'planned' ? `Queue ${charge.title}` : `Clip on ${charge.title}`}
      scrimCloses={false}
      actions={
        <Button
          title={at === null || passed ? 'Queue it' : `Queue it for ${moment(at, zone, now, marks)}`}
          onPress={confirm}
          busy={busy}
        />
      }
    >
      <Txt tone="ink2">
        {`${channelsOf(charge) || 'It'} is kept for it from then. The timer starts with the checks at the bench, not by itself.`}
      </Txt>
      <View style={{ marginTop: 12 }}>
        <DateTimeField
          label="Clip on at"
          value={value}
          onChange={setValue}
          today={dayOf(now, zone)}
          error={tried || problem ? error : undefined}
        />
      </View>
    </BottomSheet>
  );
}
