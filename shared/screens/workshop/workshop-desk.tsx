import { useRouter, type Href } from 'expo-router';
import { useGate } from '@/shared/client/gate';
import { Rule } from '@/shared/ui/primitives/rule';
import { SectionList } from '@/shared/ui/workshop/section-list';
import { sections, type SectionKey } from '@/shared/ui/workshop/sections';
import { WorkshopColumns } from '@/shared/ui/workshop/workshop-columns';
import { InvitePart } from './invite-part';
import { WallsPart } from './walls-part';
import { workshopParts } from './workshop-parts';

/** All parts on one page; inviting and the walls stand at the side for those who may. */
export function WorkshopDesk({ section }: { section: SectionKey | null }) {
  const router = useRouter();
  const mayInvite = useGate('people:write').may;
  const mayApprove = useGate('wall:approve').may;
  return (
    <WorkshopColumns
      nav={
        <SectionList current={section ?? 'people'} onGo={(key) => router.replace(`/workshop?section=${key}` as Href)} />
      }
      work={sections
        .filter(({ key }) => key !== 'walls' || !mayApprove)
        .map(({ key }) => {
          const Part = workshopParts[key];
          return <Part key={key} titled />;
        })}
      side={
        mayInvite || mayApprove ? (
          <>
            {mayInvite ? <InvitePart /> : null}
            {mayInvite && mayApprove ? <Rule gap={0} /> : null}
            {mayApprove ? <WallsPart titled /> : null}
          </>
        ) : null
      }
    />
  );
}
