import { useState } from 'react';
import { View } from 'react-native';
import type { ChargeDto } from '@/shared/contract/charge';
import { clock } from '../format/clock';
import { useFormats } from '../format/formats';
import { BottomSheet } from '../primitives/bottom-sheet';
import { Button } from '../primitives/button';
import { TimeField } from '../primitives/time-field';
import { Txt } from '../primitives/txt';
import { channelsOf } from './card-model';
import { latestInstant, noTimeSentence } from './said-at';

/** Since when the current is off: a time of day, as it was looked at on the clock at the bench. */
export function OffSinceSheet({
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
  const [text, setText] = useState(() => clock(now, zone, marks));
  const [tried, setTried] = useState(false);
  const at = latestInstant(text, zone, now);
  const reckoned = charge.currentEndAt === null ? null : Date.parse(charge.currentEndAt);
  const confirm = () => {
    setTried(true);
    if (at !== null) onConfirm(at);
  };
  return (
    <BottomSheet
      open
      onClose={onClose}
      title={`${channelsOf(charge) || 'The resistor'} is off`}
      scrimCloses={false}
      actions={
        <Button
          title={at === null ? 'It is off' : `It is off since ${clock(at, zone, marks)}`}
          onPress={confirm}
          busy={busy}
        />
      }
    >
      <Txt tone="ink2">The rest counts from then. Bidewell switches nothing: look that it is off.</Txt>
      <View style={{ marginTop: 12 }}>
        <TimeField
          label="Switched off at"
          value={text}
          onChangeText={setText}
          error={tried && at === null ? noTimeSentence : (problem ?? undefined)}
          hint={
            reckoned !== null && reckoned <= now
              ? `By the reckoning it ended ${clock(reckoned, zone, marks)}.`
              : undefined
          }
          onSubmit={confirm}
          autoFocus
        />
      </View>
    </BottomSheet>
  );
}
