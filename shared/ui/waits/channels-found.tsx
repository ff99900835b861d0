import { View } from 'react-native';
import type { ChannelsNeededDto } from '@/shared/contract/waits-replay';
import { Num } from '../primitives/num';
import { Txt } from '../primitives/txt';
import { leftOutWords, waitWithInterval } from './replay-words';

/** How many channels a wished wait takes, by replay, with the formula's figure beside it as what it is. */
export function ChannelsFound({ found, name }: { found: ChannelsNeededDto; name: string }) {
  const { present, channels, roughChannels, replay, leftOut } = found;
  const left = leftOutWords(leftOut);
  return (
    <View style={{ rowGap: 6 }}>
      {channels === null ? (
        <Txt bold>{`Not even 24 channels like ${name} give this wait: the charges themselves take longer.`}</Txt>
      ) : (
        <>
          <Num value={String(channels)} unit={channels === 1 ? 'channel' : 'channels'} kind="numM" />
          <Txt>{`like ${name}; now ${present}. 9 of 10 are then ready under ${waitWithInterval(replay.p90WaitHours)}, half under ${waitWithInterval(replay.p50WaitHours)}.`}</Txt>
        </>
      )}
      <Txt kind="small" tone="ink2">
        {roughChannels === null
          ? 'Rough check by Erlang’s formula: none, a charge alone takes longer than is wished.'
          : `Rough check by Erlang’s formula, all kinds of channels together: ${roughChannels}. It knows no working hours and no due times.`}
      </Txt>
      {left ? (
        <Txt kind="small" tone="ink2">
          {left}
        </Txt>
      ) : null}
    </View>
  );
}
