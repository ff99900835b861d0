import { useRouter, type Href } from 'expo-router';
import { sentenceOf } from '@/shared/client/api-problem';
import { isMissing, useMailbox } from '@/shared/client/mailbox';
import { MailboxPart } from '@/shared/screens/demo/mailbox-part';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { Empty } from '@/shared/ui/states/empty';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Loading } from '@/shared/ui/states/loading';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** Every letter and push that the server of the demo has sent. A real workshop has no such place. */
export default function Mailbox() {
  const router = useRouter();
  const mailbox = useMailbox();
  const back = () => (router.canGoBack() ? router.back() : router.replace('/more' as Href));
  if (isMissing(mailbox.error))
    return (
      <Screen header={<HeaderBar title="Not here" onBack={back} />} single>
        <Empty
          sentence="Nothing stands at this address."
          action={{ title: 'Go to the bench', onPress: () => router.replace('/bench' as Href) }}
        />
      </Screen>
    );
  return (
    <Screen header={<HeaderBar title="Mailbox of the demo" sub="What the server has sent" onBack={back} />} single>
      {mailbox.data ? (
        <MailboxPart
          mailbox={mailbox.data}
          stale={mailbox.isError ? sentenceOf(mailbox.error) : null}
          onGo={(path) => router.push(path as Href)}
        />
      ) : mailbox.isError ? (
        <ErrorState
          failed="What was sent could not be read."
          safe="It was sent all the same."
          toDo={sentenceOf(mailbox.error)}
          action={{ title: 'Try again', onPress: () => void mailbox.refetch(), busy: mailbox.isFetching }}
        />
      ) : (
        <Loading what="what was sent" onRetry={() => void mailbox.refetch()} />
      )}
    </Screen>
  );
}
