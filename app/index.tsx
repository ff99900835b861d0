import { useRouter, type Href } from 'expo-router';
import { useEffect } from 'react';
import { useSession } from '@/shared/client/session';
import { returnTo } from '@/shared/client/session-state';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** The front door: on to the bench (or to where the last session ended), else to the sign-in. */
export default function Start() {
  const router = useRouter();
  const signedIn = Boolean(useSession().data);
  useEffect(() => {
    router.replace((signedIn ? (returnTo.take() ?? '/bench') : '/sign-in') as Href);
  }, [router, signedIn]);
  return null;
}
