import { useState } from 'react';
import { View } from 'react-native';
import { ChoiceList } from '../primitives/choice-row';
import { ConfirmSheet } from '../primitives/confirm-sheet';
import { Field } from '../primitives/field';
import { Txt } from '../primitives/txt';

const other = 'other';
const faults = [
  'No current though it is switched on',
  'It shows an error',
  'It is hot, or its fan stands',
  'A lead or a clip is damaged',
] as const;

/** Says that a channel is out of order: what was seen, from a short list or in words. */
export function ChannelFaultSheet({
  channels,
  busy,
  problem,
  onClose,
  onConfirm,
}: {
  /** Those it may be; one that stands alone is it. */
  channels: readonly { id: string; name: string }[];
  busy: boolean;
  problem: string | null;
  onClose: () => void;
  onConfirm: (input: { id: string; seen: string }) => void;
}) {
  const [only] = channels;
  const [id, setId] = useState<string | null>(channels.length === 1 && only ? only.id : null);
  const [chosen, setChosen] = useState<string | null>(null);
  const [words, setWords] = useState('');
  const seen = chosen === other ? words.trim() : (chosen ?? '');
  const name = channels.find((one) => one.id === id)?.name ?? null;
  return (
    <ConfirmSheet
      open
      title={name === null ? 'A channel is out of order' : `${name} is out of order`}
      confirm="It is out of order"
      safe="It works"
      ready={id !== null && seen !== ''}
      why={id === null ? 'Say which one, and what was seen.' : 'Say what was seen first.'}
      busy={busy}
      onClose={onClose}
      onConfirm={() => id !== null && onConfirm({ id, seen })}
    >
      <Txt tone="ink2">
        Switch it off at the charger first: Bidewell switches nothing. Plans leave it out from now on, and whoever has a
        charge on it is told.
      </Txt>
      {channels.length > 1 ? (
        <>
          <Txt kind="label" style={{ marginTop: 14, marginBottom: 2 }}>
            Which channel
          </Txt>
          <ChoiceList
            label="Which channel"
            value={id}
            onChange={setId}
            outset={14}
            choices={channels.map((one) => ({ value: one.id, title: one.name }))}
          />
        </>
      ) : null}
      <Txt kind="label" style={{ marginTop: 14, marginBottom: 2 }}>
        What was seen
      </Txt>
      <ChoiceList
        label="What was seen"
        value={chosen}
        onChange={setChosen}
        outset={14}
        choices={[
          ...faults.map((title) => ({ value: title as string, title })),
          { value: other, title: 'Something else' },
        ]}
      />
      {chosen === other ? (
        <View style={{ marginTop: 10, marginBottom: 4 }}>
          <Field label="What was seen, in words" value={words} onChangeText={setWords} maxLength={200} autoFocus />
        </View>
      ) : null}
      {problem ? (
        <Txt kind="label" tone="alarm" role="alert">
          {problem}
        </Txt>
      ) : null}
    </ConfirmSheet>
  );
}
