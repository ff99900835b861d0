import { useRouter, type Href } from 'expo-router';
import { View } from 'react-native';
import { sentenceOf } from '@/shared/client/api-problem';
import { useLink } from '@/shared/client/link';
import { useChangeWeeklyDigest, useWeeklyDigest } from '@/shared/client/weekly-digest';
import type { WeeklyDigestDto } from '@/shared/contract/weekly-digest';
import { CheckBox } from '@/shared/ui/primitives/check-box';
import { Txt } from '@/shared/ui/primitives/txt';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Loading } from '@/shared/ui/states/loading';

/** Whether the weekly letter about the waits comes: one tick, saved as it is set. */
export function DigestScreen() {
  const router = useRouter();
  const digest = useWeeklyDigest();
  const back = () => (router.canGoBack() ? router.back() : router.replace('/more' as Href));
  return (
    <Screen header={<HeaderBar title="Weekly letter" sub="about the waits" onBack={back} />} single>
      {digest.data ? (
        <DigestSetting digest={digest.data} />
      ) : digest.isError ? (
        <ErrorState
          failed="Whether the letter comes could not be read."
          safe="It comes as it was set."
          toDo={sentenceOf(digest.error)}
          action={{ title: 'Try again', onPress: () => void digest.refetch(), busy: digest.isFetching }}
        />
      ) : (
        <Loading what="the weekly letter" onRetry={() => void digest.refetch()} />
      )}
    </Screen>
  );
}

function DigestSetting({ digest }: { digest: WeeklyDigestDto }) {
  const change = useChangeWeeklyDigest();
  const down = useLink().state === 'down';
  // While it is being saved the tick stands as it was set.
  const on = change.isPending ? change.variables.on : digest.on;
  return (
    <View style={{ rowGap: 10, paddingTop: 8 }}>
      <CheckBox
        title="Send me the waits of each week"
        meaning={`The week’s hours and the three facts that changed most, by e-mail to ${digest.eMail.address}.`}
        checked={on}
        disabled={down || change.isPending}
        onChange={(next) => change.mutate({ on: next })}
      />
      {digest.eMail.on ? null : (
        <Txt tone="ink2">
          This server cannot send e-mail yet: whoever runs it has to say by which mail server. The letter comes once it
          can.
        </Txt>
      )}
      {down ? (
        <Txt kind="small" tone="ink2">
          No connection: this can be changed when it is back.
        </Txt>
      ) : null}
      {change.isError ? (
        <Txt tone="alarm" role="alert">
          {`It stays as it was. ${sentenceOf(change.error)}`}
        </Txt>
      ) : null}
      <Txt kind="small" tone="ink2">
        Each letter has a link that ends it, too.
      </Txt>
    </View>
  );
}
