import { useState } from 'react';
import type { PersonDto } from '@/shared/contract/people';
import { BottomSheet } from '../primitives/bottom-sheet';
import { Button } from '../primitives/button';
import { ChoiceList } from '../primitives/choice-row';
import { Txt } from '../primitives/txt';

const roleWords = { technician: 'Technician', foreman: 'Foreman', manager: 'Manager' } as const;

/** Choose a colleague: to hand a charge over, or to pass an alert on. */
export function HandOverSheet({
  open,
  title,
  confirm,
  people,
  presentId,
  busy,
  problem,
  onClose,
  onChoose,
}: {
  open: boolean;
  title: string;
  /** 'Hand over', 'Pass on' */
  confirm: string;
  people: readonly PersonDto[] | undefined;
  /** Not offered: has it now. */
  presentId: string | null;
  busy: boolean;
  problem: string | null;
  onClose: () => void;
  onChoose: (personId: string) => void;
}) {
  const [chosen, setChosen] = useState<string | null>(null);
  const others = (people ?? []).filter((person) => !person.disabled && person.id !== presentId);
  const name = others.find((person) => person.id === chosen)?.name.split(' ')[0];
  return (
    <BottomSheet
      open={open}
      onClose={onClose}
      title={title}
      actions={
        <Button
          title={name ? `${confirm} to ${name}` : 'Choose a person first'}
          disabled={chosen === null}
          busy={busy}
          onPress={() => chosen && onChoose(chosen)}
        />
      }
    >
      {people === undefined ? <Txt tone="ink2">Reading the list of people.</Txt> : null}
      {people && others.length === 0 ? <Txt tone="ink2">Nobody else is in this workshop yet.</Txt> : null}
      <ChoiceList
        label="To whom"
        value={chosen}
        onChange={setChosen}
        choices={others.map((person) => ({ value: person.id, title: person.name, meaning: roleWords[person.role] }))}
      />
      {problem ? (
        <Txt tone="alarm" bold role="alert">
          {problem}
        </Txt>
      ) : null}
    </BottomSheet>
  );
}
