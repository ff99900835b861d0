import { useRouter, type Href } from 'expo-router';
import { clock } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { useBreakpoint } from '@/shared/ui/theme/use-breakpoint';
import type { PlanPage } from './use-plan-page';

/** What is planned: repair, module and type; on the desk also the spare and where it lies. */
export function PlanHeader({ page: { topUpOf, typed, spare, now } }: { page: PlanPage }) {
  const router = useRouter();
  const { zone, marks } = useFormats();
  const wide = useBreakpoint() === 'wide';
  const parts = [
    typed.repairRef,
    typed.modulePosition && `module ${typed.modulePosition}`,
    spare?.typeName,
    wide && spare ? `spare ${spare.label}${spare.shelfPlace ? `, shelf ${spare.shelfPlace}` : ''}` : '',
  ];
  return (
    <HeaderBar
      title={topUpOf ? 'Plan the top-up' : 'Plan a charge'}
      sub={parts.filter(Boolean).join(' · ') || undefined}
      onBack={() => (router.canGoBack() ? router.back() : router.replace('/bench' as Href))}
      clock={clock(now, zone, marks)}
    />
  );
}
