import { lazy, Suspense, type ReactNode } from 'react';
import { View } from 'react-native';
import { OutcomeLarge } from '@/shared/ui/plan/plan-outcome';
import { optionTitle } from '@/shared/ui/plan/way-words';
import { StandingLine } from '@/shared/ui/primitives/call-out';
import { useBreakpoint } from '@/shared/ui/theme/use-breakpoint';
import type { PlanPage } from './use-plan-page';

const PlanPicture = lazy(async () => ({ default: (await import('@/shared/ui/plan/plan-picture')).PlanPicture }));

/** The picture of the chosen way; on the desk also what it comes to, and the acts. */
export function PlanSide({ page, acts }: { page: PlanPage; acts: ReactNode }) {
  const { chosen, dto, now, refused } = page;
  const wide = useBreakpoint() === 'wide';
  return (
    <View style={{ rowGap: 18 }}>
      {chosen && dto ? (
        <Suspense fallback={null}>
          <PlanPicture
            heading={wide ? 'The picture' : `${optionTitle(chosen)}, ${chosen.channelText.replace(/^.* · /, '')}`}
            option={chosen}
            clipOnAt={Date.parse(dto.clipOnAt)}
            targetVolts={dto.targetVolts}
          />
        </Suspense>
      ) : null}
      {wide && chosen && dto ? <OutcomeLarge dto={dto} option={chosen} now={now} /> : null}
      <StandingLine />
      {wide && !refused ? acts : null}
    </View>
  );
}
