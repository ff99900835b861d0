import { useRouter, type Href } from 'expo-router';
import { View } from 'react-native';
import { sentenceOf } from '@/shared/client/api-problem';
import { useBoard } from '@/shared/client/board';
import { useNow } from '@/shared/client/clock';
import { useLink } from '@/shared/client/link';
import { useMember } from '@/shared/client/session';
import { armSound, useSoundState } from '@/shared/client/sound';
import { BenchList } from '@/shared/ui/bench/bench-list';
import { clock } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { Button } from '@/shared/ui/primitives/button';
import { IconButton } from '@/shared/ui/primitives/icon-button';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { Empty } from '@/shared/ui/states/empty';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Loading } from '@/shared/ui/states/loading';
import { margin } from '@/shared/ui/theme/tokens';
import { useBreakpoint } from '@/shared/ui/theme/use-breakpoint';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** All charges of the workshop, what needs somebody first. */
export default function Bench() {
  const router = useRouter();
  const { person, workshop } = useMember();
  const { zone, marks } = useFormats();
  const now = useNow(1000);
  const board = useBoard();
  const wide = useBreakpoint() === 'wide';
  const old = useLink().state === 'down';
  const go = (path: string) => router.push(path as Href);
  const plan = (
    <Button title="Plan a charge" icon="plan" onPress={() => go('/plan')} size={wide ? 'small' : 'normal'} />
  );
  const charges = board.data?.charges;
  return (
    <Screen
      header={
        <HeaderBar
          title="Bench"
          sub={`${person.name.split(' ')[0]} · ${workshop.name}`}
          clock={clock(now, zone, marks)}
          tools={<Sound />}
          action={charges && charges.length > 0 ? plan : undefined}
        />
      }
      foot={
        wide || !charges || charges.length === 0 ? undefined : (
          <View style={{ paddingHorizontal: margin.phone, paddingVertical: 12 }}>{plan}</View>
        )
      }
    >
      {charges ? (
        charges.length === 0 ? (
          <Empty
            sentence="No charges. Plan the first from a spare on the shelf."
            action={{ title: 'Plan a charge', icon: 'plan', onPress: () => go('/plan') }}
          />
        ) : (
          <BenchList charges={charges} now={now} old={old} onGo={go} />
        )
      ) : board.isError ? (
        <ErrorState
          failed="The bench could not be read."
          safe="The charges go on as they were set."
          toDo={sentenceOf(board.error)}
          action={{ title: 'Try again', onPress: () => void board.refetch(), busy: board.isFetching }}
        />
      ) : (
        <Loading what="the bench" onRetry={() => void board.refetch()} />
      )}
    </Screen>
  );
}

/** Shown only while this device would stay silent. */
function Sound() {
  const state = useSoundState();
  if (state === 'none') return null;
  return state === 'muted' ? (
    <IconButton icon="muted" label="The sound is muted: tap to hear alerts" onPress={() => void armSound()} />
  ) : (
    <IconButton
      icon={state === 'on' ? 'sound' : 'muted'}
      label={state === 'on' ? 'Sound is on' : 'Sound is off'}
      onPress={() => void armSound()}
    />
  );
}
