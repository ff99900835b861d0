import { Stack, useSegments } from 'expo-router';
import { useEffect } from 'react';
import { ClientProvider } from '@/shared/client/client-provider';
import { usePreferences } from '@/shared/client/preferences';
import { useOtherTabs, useSession } from '@/shared/client/session';
import { returnTo } from '@/shared/client/session-state';
import { useZone } from '@/shared/client/workshop';
import { FormatsProvider } from '@/shared/ui/format/formats';
import { ToastProvider } from '@/shared/ui/primitives/toast';
import { titleOf } from '@/shared/ui/shell/places';
import { StartFailed } from '@/shared/ui/shell/start-failed';
import { usePageTitle } from '@/shared/ui/shell/use-page-title';
import { ThemeProvider, useTheme } from '@/shared/ui/theme/theme';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

export default function RootLayout() {
  return (
    <ClientProvider>
      <Dressed />
    </ClientProvider>
  );
}

function Dressed() {
  const { theme } = usePreferences();
  const zone = useZone();
  return (
    <ThemeProvider choice={theme}>
      <FormatsProvider languageTag={navigator.language} zone={zone}>
        <ToastProvider>
          <Screens />
        </ToastProvider>
      </FormatsProvider>
    </ThemeProvider>
  );
}

/** Screens that need nobody to be signed in, and so do not wait to know who is. */
const open = /^\/(wall|estimate|join|create|sign-in)(\/|$)/;
const beginsOpen = open.test(globalThis.location?.pathname ?? '/');

function Screens() {
  const { data: session, isError, refetch, isFetching } = useSession();
  const { colors } = useTheme();
  usePageTitle(titleOf(useSegments()));
  const signedIn = Boolean(session);
  useOtherTabs();
  const waiting = session === undefined && !beginsOpen;

  useEffect(() => {
    // A deep link (a label's code, a notice) is opened after signing in.
    const { pathname, search } = globalThis.location;
    if (!waiting && !signedIn && pathname !== '/' && !open.test(pathname)) returnTo.keep(pathname + search);
    // Only the address that the page was opened with.
    // eslint-disable-next-line react-hooks/exhaustive-deps
  }, [waiting]);

  // Nothing is drawn before it is known who is here: a guard that changes its mind would lose the address.
  if (waiting) return isError ? <StartFailed busy={isFetching} onRetry={() => void refetch()} /> : null;
  return (
    <Stack
      screenOptions={{
        headerShown: false,
        animation: 'none',
        contentStyle: { backgroundColor: colors.ground },
      }}
    >
      <Stack.Screen name="index" />
      <Stack.Screen name="estimate" />
      <Stack.Screen name="wall" />
      <Stack.Screen name="join" />
      <Stack.Protected guard={!signedIn}>
        <Stack.Screen name="sign-in" />
        <Stack.Screen name="create" />
      </Stack.Protected>
      <Stack.Protected guard={signedIn}>
        <Stack.Screen name="(workshop)" />
        <Stack.Screen name="approve" />
      </Stack.Protected>
    </Stack>
  );
}
