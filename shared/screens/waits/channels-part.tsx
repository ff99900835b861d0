import { useState } from 'react';
import { View } from 'react-native';
import { useLink } from '@/shared/client/link';
import { useReplay } from '@/shared/client/replays';
import { Button } from '@/shared/ui/primitives/button';
import { Field } from '@/shared/ui/primitives/field';
import { Select } from '@/shared/ui/primitives/select';
import { Txt } from '@/shared/ui/primitives/txt';
import { ChannelsFound } from '@/shared/ui/waits/channels-found';
import { numberTyped } from '@/shared/ui/waits/lever-form';
import { tooFewWords } from '@/shared/ui/waits/replay-words';
import { useChannelOptions } from './lever-fields';
import { ReplayState } from './replay-state';
import type { WaitAddressHeld } from './use-wait-address';

/** How many channels of a kind it takes for nine of ten charges to be ready within the wished wait. */
export function ChannelsPart({ address }: { address: WaitAddressHeld }) {
  const { from, to } = address.query;
  const options = useChannelOptions();
  const replay = useReplay('channels-needed');
  const down = useLink().state === 'down';
  const [channelId, setChannelId] = useState<string | null>(null);
  const [typed, setTyped] = useState('');
  const [tried, setTried] = useState(false);
  const [askedFor, setAskedFor] = useState('');
  const hours = numberTyped(typed);
  const fits = hours !== null && hours >= 0.1 && hours <= 1000;
  const asked = `${from} ${to} ${channelId} ${hours}`;
  const found = replay.job?.state === 'done' && askedFor === asked ? replay.job.channels : null;
  const name = options.find(({ value }) => value === channelId)?.label ?? '';
  const begin = () => {
    setTried(true);
    if (channelId === null || hours === null || !fits) return;
    setAskedFor(asked);
    replay.begin({ from, to, channelId, wishedP90Hours: hours });
  };
  return (
    <View style={{ rowGap: 10 }} role="region" aria-label="Channels needed">
      <Txt kind="heading" heading={2}>
        Channels needed
      </Txt>
      <Select
        label="Like channel"
        size="low"
        empty="Choose a channel"
        value={channelId}
        options={options}
        onChange={setChannelId}
        {...(tried && channelId === null ? { error: 'Choose a channel.' } : {})}
      />
      <Field
        label="9 of 10 ready within"
        kind="decimal"
        unit="h"
        size="low"
        value={typed}
        onChangeText={setTyped}
        {...(tried && !fits ? { error: 'Type hours, 0.1 to 1,000.' } : {})}
      />
      {found ? (
        found.enough ? (
          <ChannelsFound found={found} name={name} />
        ) : (
          <Txt tone="ink2">{tooFewWords(found)}</Txt>
        )
      ) : null}
      <ReplayState replay={replay} />
      {down ? (
        <Txt kind="small" tone="ink2" nativeID="channels-why">
          No connection: the number is found by the server.
        </Txt>
      ) : null}
      <Button
        look="line"
        size="small"
        title="Find the number of channels"
        disabled={down}
        {...(down ? { describedBy: 'channels-why' } : {})}
        busy={replay.busy}
        onPress={begin}
      />
    </View>
  );
}
