import { useRouter, type Href } from 'expo-router';
import { View } from 'react-native';
import { useNow } from '@/shared/client/clock';
import { useLink } from '@/shared/client/link';
import { useWaiting, useWaitingWrites } from '@/shared/client/waiting/waiting';
import { clock } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { Txt } from '@/shared/ui/primitives/txt';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { Empty } from '@/shared/ui/states/empty';
import { useBreakpoint } from '@/shared/ui/theme/use-breakpoint';
import { editPath } from '@/shared/ui/waiting/waiting-items';
import { WaitingHere } from '@/shared/ui/waiting/waiting-here';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** Everything that waits on this device for the connection, by charge. */
export default function Waiting() {
  const router = useRouter();
  const { zone, marks } = useFormats();
  const now = useNow(1000);
  const all = useWaitingWrites();
  const down = useLink().state === 'down';
  const device = useBreakpoint() === 'phone' ? 'phone' : 'device';
  const charges = [...new Map(all.map((write) => [write.chargeId, write.title]))];
  return (
    <Screen
      single
      header={
        <HeaderBar
          title={`Waiting on this ${device}`}
          onBack={() => (router.canGoBack() ? router.back() : router.replace('/bench' as Href))}
          clock={clock(now, zone, marks)}
        />
      }
    >
      {charges.length === 0 ? (
        <Empty
          sentence={`Nothing waits on this ${device}. What you logged is with the charges.`}
          action={{ title: 'Open the bench', onPress: () => router.replace('/bench' as Href) }}
        />
      ) : (
        <View style={{ rowGap: 24 }}>
          <Txt tone="ink2">
            {down
              ? 'Sent in this order when the connection is back, each with the time it was done.'
              : 'Sent in this order, each with the time it was done.'}
          </Txt>
          {charges.map(([id, title]) => (
            <OfCharge key={id} id={id} title={title} now={now} device={device} />
          ))}
        </View>
      )}
    </Screen>
  );
}

function OfCharge({ id, title, now, device }: { id: string; title: string; now: number; device: string }) {
  const router = useRouter();
  const here = useWaiting(id);
  return (
    <WaitingHere
      items={here.waiting}
      last={null}
      now={now}
      device={device}
      title={title}
      onRemove={(key) => void here.remove(key)}
      onSettle={(key, at) => void here.settle(key, at)}
      onEdit={(item) => router.push((editPath(item) ?? `/charges/${id}`) as Href)}
    />
  );
}
