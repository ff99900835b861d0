import { useRouter, type Href } from 'expo-router';
import { useAlertSettings } from '@/shared/client/alert-settings';
import { sentenceOf } from '@/shared/client/api-problem';
import { useMember } from '@/shared/client/session';
import { CausesPart } from '@/shared/screens/alerts/causes-part';
import { DevicesPart } from '@/shared/screens/alerts/devices-part';
import { QuietPart } from '@/shared/screens/alerts/quiet-part';
import { Columns } from '@/shared/ui/screen/columns';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Loading } from '@/shared/ui/states/loading';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** Where one's own alerts go: by cause, in which hours, to which devices. */
export default function AlertSettings() {
  const router = useRouter();
  const { person } = useMember();
  const settings = useAlertSettings();
  const back = () => (router.canGoBack() ? router.back() : router.replace('/more' as Href));
  return (
    <Screen header={<HeaderBar title="Alerts and where they go" sub={person.name} onBack={back} />}>
      {settings.data ? (
        <Columns
          work={<CausesPart settings={settings.data} />}
          side={
            <>
              <DevicesPart settings={settings.data} />
              <QuietPart settings={settings.data} />
            </>
          }
        />
      ) : settings.isError ? (
        <ErrorState
          failed="Where your alerts go could not be read."
          safe="They come as they were set."
          toDo={sentenceOf(settings.error)}
          action={{ title: 'Try again', onPress: () => void settings.refetch(), busy: settings.isFetching }}
        />
      ) : (
        <Loading what="where your alerts go" onRetry={() => void settings.refetch()} />
      )}
    </Screen>
  );
}
