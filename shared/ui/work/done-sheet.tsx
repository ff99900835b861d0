import { useState } from 'react';
import { readQuantity } from '@/shared/contract/read-quantity';
import { NBSP } from '../format/marks';
import { BottomSheet } from '../primitives/bottom-sheet';
import { Button } from '../primitives/button';
import { Field } from '../primitives/field';
import { SheetFields } from '../primitives/sheet-fields';
import { Txt } from '../primitives/txt';

/** Ends a stint: all of it is done, or so many minutes of it are left. */
export function DoneSheet({
  title,
  busy,
  problem,
  onClose,
  onEnd,
}: {
  /** What was worked at. */
  title: string;
  busy: boolean;
  problem: string | null;
  onClose: () => void;
  /** @param minutesLeft by the likely estimate; 0: done */
  onEnd: (minutesLeft: number) => void;
}) {
  const [typed, setTyped] = useState('');
  const [left, setLeft] = useState(false);
  const reading = readQuantity(typed, { name: 'Minutes left', unit: 'min', min: 0, max: 4800, whole: true });
  const nothing = typed.trim() === '' || (reading.ok && reading.value === 0);
  const error = nothing ? 'Type how many minutes are left.' : reading.ok ? undefined : reading.message;
  const part = reading.ok && reading.value > 0;
  return (
    <BottomSheet
      open
      title={title}
      scrimCloses={false}
      onClose={onClose}
      actions={
        <>
          <Button
            look="line"
            title={part ? `Put ${reading.value}${NBSP}min back on the list` : 'Part of it is left'}
            busy={busy}
            onPress={() => {
              setLeft(true);
              if (part) onEnd(reading.value);
            }}
          />
          <Button title="All of it is done" busy={busy} disabled={part} onPress={() => onEnd(0)} />
        </>
      }
    >
      <SheetFields>
        <Field
          label="Minutes still to be done"
          kind="whole"
          unit="min"
          value={typed}
          onChangeText={(text) => {
            setTyped(text);
            setLeft(false);
          }}
          onBlur={() => setLeft(typed.trim() !== '')}
          hint="left empty: all of it is done"
          error={left ? error : undefined}
        />
        {problem ? (
          <Txt tone="alarm" bold role="alert">
            {problem}
          </Txt>
        ) : null}
      </SheetFields>
    </BottomSheet>
  );
}
