import { useState } from 'react';
import { View } from 'react-native';
import { sentenceOf } from '@/shared/client/api-problem';
import { useChannelFailed, useChannelWorks } from '@/shared/client/channel-faults';
import { useCan } from '@/shared/client/session';
import type { ChargeDto } from '@/shared/contract/charge';
import { ChannelFaultCallOut } from '@/shared/ui/charge/channel-fault-call-out';
import { ChannelFaultSheet } from '@/shared/ui/charge/channel-fault-sheet';
import { Link } from '@/shared/ui/primitives/link';
import { useToast } from '@/shared/ui/primitives/toast';

/** The channels of a charge: those out of order, and the way to say so of another. */
export function ChannelsPart({ charge, now, offline }: { charge: ChargeDto; now: number; offline: boolean }) {
  const failed = useChannelFailed();
  const works = useChannelWorks();
  const mayClear = useCan('charge:assign');
  const toast = useToast();
  const [asked, setAsked] = useState(false);
  const sound = charge.channels.filter(({ fault }) => fault === null);
  return (
    <>
      {charge.channels.map(({ fault, ...channel }) =>
        fault === null ? null : (
          <ChannelFaultCallOut
            key={channel.id}
            charge={charge}
            channel={{ ...channel, fault }}
            now={now}
            mayClear={mayClear}
            busy={works.isPending && works.variables.id === channel.id}
            disabled={offline}
            problem={works.error && works.variables?.id === channel.id ? sentenceOf(works.error) : null}
            onWorks={() =>
              works.mutate(
                { id: channel.id },
                { onSuccess: () => toast({ text: `${channel.name} is in order again.` }) },
              )
            }
          />
        ),
      )}
      {sound.length === 0 ? null : (
        <View>
          <Link
            title={sound.length === 1 ? `${sound[0]?.name} is out of order` : 'a channel is out of order'}
            kind="small"
            disabled={offline}
            onPress={() => {
              failed.reset();
              setAsked(true);
            }}
          />
        </View>
      )}
      {asked ? (
        <ChannelFaultSheet
          channels={sound}
          busy={failed.isPending}
          problem={failed.error ? sentenceOf(failed.error) : null}
          onClose={() => setAsked(false)}
          onConfirm={(input) =>
            failed.mutate(input, {
              onSuccess: () => {
                setAsked(false);
                toast({ text: 'It is noted. Whoever has a charge on it is told.' });
              },
            })
          }
        />
      ) : null}
    </>
  );
}
