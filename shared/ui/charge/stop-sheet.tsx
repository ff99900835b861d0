import { useState } from 'react';
import type { ChargeDto } from '@/shared/contract/charge';
import { ampHoursNumber, clipVolts } from '../format/quantities';
import { useFormats } from '../format/formats';
import { CheckBox } from '../primitives/check-box';
import { ChoiceList } from '../primitives/choice-row';
import { ConfirmSheet } from '../primitives/confirm-sheet';
import { Field } from '../primitives/field';
import { Txt } from '../primitives/txt';

const other = 'other';
const reasons = {
  stop: [
    'Warm, smells, or swollen',
    'Odd reading, not explained',
    'Wrong spare or wrong target',
    'The channel is needed',
  ],
  hold: [
    'The channel is needed for a moment',
    'Nobody is there to look in',
    'A clip or lead is to be changed',
    'Too warm, to cool down',
  ],
} as const;

/** Stop or hold a charge: why, from a short list or in words; the safe choice is nearest the thumb. */
export function StopSheet({
  kind,
  charge,
  open,
  busy,
  problem,
  onClose,
  onConfirm,
}: {
  kind: 'stop' | 'hold';
  charge: ChargeDto;
  open: boolean;
  busy: boolean;
  problem: string | null;
  onClose: () => void;
  onConfirm: (input: { reason: string; quarantine: boolean }) => void;
}) {
  const { marks } = useFormats();
  const [chosen, setChosen] = useState<string | null>(null);
  const [words, setWords] = useState('');
  const [quarantine, setQuarantine] = useState(false);
  const reason = chosen === other ? words.trim() : (chosen ?? '');
  const channel = charge.channelNames.join(', ');
  const mean = charge.groups.reduce((sum, group) => sum + group.volts, 0) / Math.max(1, charge.groups.length);
  const stop = kind === 'stop';
  return (
    <ConfirmSheet
      open={open}
      title={stop ? `Stop the charge of ${charge.spare.label}` : `Hold the charge of ${charge.spare.label}`}
      confirm={stop ? 'It is off: stop the charge' : 'It is off: hold the charge'}
      safe="Let it run"
      ready={reason !== ''}
      why="Say why first. It is kept with the charge."
      busy={busy}
      onClose={onClose}
      onConfirm={() => onConfirm({ reason, quarantine })}
    >
      <Txt>
        <Txt bold>{channel ? `Switch ${channel} off at the charger first. ` : ''}</Txt>
        Bidewell switches nothing. Here you note that it was {stop ? 'stopped' : 'held'}, and why.
      </Txt>
      <ChoiceList
        label="Why"
        value={chosen}
        onChange={setChosen}
        outset={14}
        choices={[
          ...reasons[kind].map((title) => ({ value: title, title })),
          { value: other, title: 'Something else' },
        ]}
      />
      {chosen === other ? (
        <Field label="The reason" value={words} onChangeText={setWords} maxLength={300} autoFocus />
      ) : null}
      {stop ? (
        <CheckBox
          checked={quarantine}
          onChange={setQuarantine}
          title={`Put ${charge.spare.label} into quarantine`}
          meaning="It is not offered for a plan until a foreman releases it."
        />
      ) : null}
      <Txt kind="small" tone="ink2">
        {`${ampHoursNumber(charge.deliveredAh, marks)} of ${ampHoursNumber(charge.plannedAh, marks)} Ah ${charge.direction === 'charge' ? 'in' : 'out'}, about ${clipVolts(mean, marks)} a group, reckoned and not measured. ${stop ? `${charge.title} then has no charge.` : 'Resume goes on from what is reached then.'}`}
      </Txt>
      {problem ? (
        <Txt tone="alarm" bold role="alert">
          {problem}
        </Txt>
      ) : null}
    </ConfirmSheet>
  );
}
