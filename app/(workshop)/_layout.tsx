import { Stack, usePathname, useRouter, type Href } from 'expo-router';
import { useCallback, useEffect } from 'react';
import { View } from 'react-native';
import { useAlarmBell } from '@/shared/client/alarm-bell';
import { useBuildOffer, useKeptApp } from '@/shared/client/build-offer';
import { useOpenAlertCount } from '@/shared/client/alerts';
import { useLink } from '@/shared/client/link';
import { startLive } from '@/shared/client/live';
import { takeNewBuild } from '@/shared/client/new-build';
import { useNotices } from '@/shared/client/notices';
import { useReadOut } from '@/shared/client/read-out';
import { useNeedsSomebodyCount } from '@/shared/client/repairs';
import { useCan, useKeptAnswers, useSession } from '@/shared/client/session';
import { useWaitingCounts, useWaitingRunner } from '@/shared/client/waiting/waiting';
import { clock } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { AlertRegion } from '@/shared/ui/primitives/live-region';
import { OfflineStrip } from '@/shared/ui/primitives/offline-strip';
import type { NavItem } from '@/shared/ui/screen/nav-items';
import { AppFrame } from '@/shared/ui/screen/screen';
import { ShellStrip } from '@/shared/ui/screen/shell-strip';
import { SideRail } from '@/shared/ui/screen/side-rail';
import { TabBar } from '@/shared/ui/screen/tab-bar';
import { NewBuildStrip } from '@/shared/ui/shell/new-build-strip';
import { NotTakenStrip } from '@/shared/ui/waiting/not-taken-strip';
import { NoticePrompt } from '@/shared/ui/shell/notice-prompt';
import { placeOf, railItems, tabItems } from '@/shared/ui/shell/places';
import { useTheme } from '@/shared/ui/theme/theme';
import { useBreakpoint } from '@/shared/ui/theme/use-breakpoint';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** The shell around every screen of the workshop: places, connection, alerts. */
export default function WorkshopLayout() {
  const router = useRouter();
  const path = usePathname();
  const { colors } = useTheme();
  const name = useSession().data?.person.name ?? '';
  const alerts = useOpenAlertCount();
  const repairs = useNeedsSomebodyCount();
  const plansBench = useCan('bench:plan');
  const seesWaits = useCan('waits:read');
  const notices = useNotices(useCallback((url: string) => router.navigate(url as Href), [router]));

  // The socket comes after the first paint.
  useEffect(() => startLive('member'), []);
  useAlarmBell();
  useWaitingRunner();
  useKeptAnswers();
  useKeptApp();

  const place = placeOf(path);
  const go = ({ href }: NavItem) => router.navigate(href as Href);
  return (
    <AppFrame
      rail={
        <SideRail
          items={railItems({ alerts, repairs, plansBench, seesWaits })}
          current={place.rail}
          onGo={go}
          person={{ key: 'more', title: name.split(' ')[0] || 'You', icon: 'person', href: '/more' }}
        />
      }
      tabs={place.tab ? <TabBar items={tabItems({ alerts, repairs })} current={place.tab} onGo={go} /> : undefined}
    >
      <ShellStrip.Provider value={<Strip />}>
        <Stack
          screenOptions={{ headerShown: false, animation: 'none', contentStyle: { backgroundColor: colors.ground } }}
        />
      </ShellStrip.Provider>
      <Announcer />
      <NoticePrompt {...notices} />
    </AppFrame>
  );
}

/** Under the header of every screen: no connection and since when, what was not taken, a new version. */
function Strip() {
  const router = useRouter();
  const path = usePathname();
  const { state, since } = useLink();
  const { waiting, refused } = useWaitingCounts();
  const offer = useBuildOffer();
  const { zone, marks } = useFormats();
  const phone = useBreakpoint() === 'phone';
  const down = state === 'down' && since !== null;
  const see = path === '/waiting' ? undefined : () => router.push('/waiting' as Href);
  const strips = [
    down ? (
      <OfflineStrip
        key="offline"
        since={clock(since, zone, marks)}
        waiting={waiting}
        device={phone ? 'phone' : 'device'}
        onSee={waiting > 0 ? see : undefined}
      />
    ) : null,
    refused > 0 && see ? <NotTakenStrip key="not-taken" count={refused} onSee={see} /> : null,
    offer.there && !down ? (
      <NewBuildStrip key="build" onTake={() => void takeNewBuild()} onLater={offer.later} />
    ) : null,
  ].filter((strip) => strip !== null);
  return strips.length === 0 ? null : <View style={{ marginBottom: 12 }}>{strips}</View>;
}

/** Reads each new alert out, once. */
function Announcer() {
  const words = useReadOut();
  return words ? <AlertRegion alerts={words} /> : null;
}
