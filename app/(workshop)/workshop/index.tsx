import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { useNow } from '@/shared/client/clock';
import { useMember } from '@/shared/client/session';
import { InvitePart } from '@/shared/screens/workshop/invite-part';
import { useCounts } from '@/shared/screens/workshop/use-counts';
import { WorkshopDesk } from '@/shared/screens/workshop/workshop-desk';
import { workshopParts } from '@/shared/screens/workshop/workshop-parts';
import { clock } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { MoreRow } from '@/shared/ui/more/more-row';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { useBreakpoint } from '@/shared/ui/theme/use-breakpoint';
import { useScrollToPart } from '@/shared/ui/workshop/scroll-to-part';
import { isSection, sections } from '@/shared/ui/workshop/sections';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** The workshop's settings: all parts on one page on the desk, a row into each of them on the phone. */
export default function Workshop() {
  const router = useRouter();
  const wide = useBreakpoint() === 'wide';
  const { section: asked } = useLocalSearchParams<{ section?: string }>();
  const section = isSection(asked) ? asked : null;
  const { workshop } = useMember();
  const { zone, marks } = useFormats();
  const time = clock(useNow(60_000), zone, marks);
  const sub = useCounts(workshop.name);
  useScrollToPart(section, wide);
  if (wide)
    return (
      <Screen header={<HeaderBar title="Workshop" sub={sub} clock={time} />}>
        <WorkshopDesk section={section} />
      </Screen>
    );
  if (section === null)
    return (
      <Screen header={<HeaderBar title="Workshop" sub={sub} clock={time} />}>
        {sections.map(({ key, title, meaning }) => (
          <MoreRow
            key={key}
            title={title}
            meaning={meaning}
            href={`/workshop?section=${key}`}
            onPress={() => router.push(`/workshop?section=${key}` as Href)}
          />
        ))}
      </Screen>
    );
  const Part = workshopParts[section];
  return (
    <Screen
      header={
        <HeaderBar
          title={sections.find(({ key }) => key === section)?.title ?? 'Workshop'}
          sub={workshop.name}
          onBack={() => (router.canGoBack() ? router.back() : router.replace('/workshop' as Href))}
          clock={time}
        />
      }
    >
      <Part titled={false} />
      {section === 'people' ? <InvitePart rule /> : null}
    </Screen>
  );
}
