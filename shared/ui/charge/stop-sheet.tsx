import { View } from 'react-native';
import type { ChargeDto } from '@/shared/contract/charge';
import { ampHoursNumber, clipVolts } from '../format/quantities';
import { useFormats } from '../format/formats';
import { CheckBox } from '../primitives/check-box';
import { ChoiceList } from '../primitives/choice-row';
import { ConfirmSheet } from '../primitives/confirm-sheet';
import { Field } from '../primitives/field';
import { Rule } from '../primitives/rule';
import { Span, Txt } from '../primitives/txt';
import { channelsOf, isFlowing } from './card-model';

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

/** What is chosen and typed so far. */
export interface StopDraft {
  chosen: string | null;
  words: string;
  quarantine: boolean;
}
export const noStopDraft: StopDraft = { chosen: null, words: '', quarantine: false };

/** Stop or hold a charge: why, from a short list or in words; the safe choice is nearest the thumb. */
export function StopSheet({
  kind,
  charge,
  draft,
  busy,
  problem,
  onDraft,
  onClose,
  onConfirm,
}: {
  kind: 'stop' | 'hold';
  charge: ChargeDto;
  draft: StopDraft;
  busy: boolean;
  problem: string | null;
  onDraft: (draft: StopDraft) => void;
  onClose: () => void;
  onConfirm: (input: { reason: string; quarantine: boolean }) => void;
}) {
  const { marks } = useFormats();
  const { chosen, words, quarantine } = draft;
  const reason = chosen === other ? words.trim() : (chosen ?? '');
  const channel = channelsOf(charge);
  const mean = charge.groups.reduce((sum, group) => sum + group.volts, 0) / Math.max(1, charge.groups.length);
  const stop = kind === 'stop';
  const flows = isFlowing(charge);
  const brought = `${ampHoursNumber(charge.deliveredAh, marks)} of ${ampHoursNumber(charge.plannedAh, marks)} Ah ${charge.direction === 'charge' ? 'in' : 'out'}, about ${clipVolts(mean, marks)} a group, reckoned and not measured.`;
  return (
    <ConfirmSheet
      open
      title={stop ? `Stop the charge of ${charge.spare.label}` : `Hold the charge of ${charge.spare.label}`}
      confirm={stop ? (flows ? 'It is off: stop the charge' : 'Stop the charge') : 'It is off: hold the charge'}
      safe={stop && !flows ? 'Keep it' : 'Let it run'}
      ready={reason !== ''}
      why="Say why first. It is kept with the charge."
      busy={busy}
      onClose={onClose}
      onConfirm={() => onConfirm({ reason, quarantine: stop && quarantine })}
    >
      <Txt tone="ink2">
        {channel && flows ? <Span bold tone="ink">{`Switch ${channel} off at the charger first. `}</Span> : null}
        Bidewell switches nothing. Here you note that it was {stop ? 'stopped' : 'held'}, and why.
      </Txt>
      <Txt kind="label" style={{ marginTop: 14, marginBottom: 2 }}>
        Why
      </Txt>
      <ChoiceList
        label="Why"
        value={chosen}
        onChange={(value) => onDraft({ ...draft, chosen: value })}
        outset={14}
        choices={[
          ...reasons[kind].map((title) => ({ value: title as string, title })),
          { value: other, title: 'Something else' },
        ]}
      />
      {chosen === other ? (
        <View style={{ marginTop: 10, marginBottom: 4 }}>
          <Field
            label="The reason"
            value={words}
            onChangeText={(text) => onDraft({ ...draft, words: text })}
            maxLength={300}
            autoFocus
          />
        </View>
      ) : null}
      {stop ? (
        <CheckBox
          checked={quarantine}
          onChange={(value) => onDraft({ ...draft, quarantine: value })}
          title={`Put ${charge.spare.label} into quarantine`}
          meaning="It is not offered for a plan until a foreman releases it."
        />
      ) : null}
      <Rule gap={8} />
      <Txt kind="small" tone="ink2">
        {`${brought} ${stop ? `${charge.title} then has no charge.` : 'Resume goes on from what is reached then.'}`}
      </Txt>
      {problem ? (
        <Txt kind="label" tone="alarm" role="alert">
          {problem}
        </Txt>
      ) : null}
    </ConfirmSheet>
  );
}
