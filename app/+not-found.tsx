import { useRouter, type Href } from 'expo-router';
import { useSession } from '@/shared/client/session';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { Empty } from '@/shared/ui/states/empty';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

export default function NotFound() {
  const router = useRouter();
  const signedIn = Boolean(useSession().data);
  const home = (signedIn ? '/bench' : '/sign-in') as Href;
  return (
    <Screen header={<HeaderBar title="Not here" />} single>
      <Empty
        sentence="Nothing stands at this address."
        action={{
          title: signedIn ? 'Go to the bench' : 'Go to the sign-in',
          onPress: () => router.replace(home),
        }}
      />
    </Screen>
  );
}
