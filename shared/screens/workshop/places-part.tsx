import { useGate } from '@/shared/client/gate';
import { partState } from '@/shared/client/part-state';
import { useStaffing } from '@/shared/client/staffing';
import { Searched } from '@/shared/ui/primitives/searched';
import { whoMay } from '@/shared/ui/workshop/may-change';
import { SectionBlock } from '@/shared/ui/workshop/section-block';
import { PlacesTable } from '@/shared/ui/workshop/staffing-tables';
import { AddLink } from './add-link';
import type { PartProps } from './part-props';
import { NothingYet } from './part-words';
import { useGo } from './use-go';

/** Bays and benches. */
export function PlacesPart({ titled }: PartProps) {
  const go = useGo();
  const gate = useGate('workshop:write');
  const staffing = useStaffing();
  const places = staffing.data?.places ?? [];
  return (
    <SectionBlock
      id="places"
      title="Places"
      titled={titled}
      aside={<AddLink title="add a place" href="/workshop/places/new" may={gate.may} />}
      state={partState(staffing)}
      what="the places"
      onRetry={() => void staffing.refetch()}
      note={whoMay(gate)}
    >
      {places.length === 0 ? (
        <NothingYet words="No bay or bench yet. Other work is then planned without asking whether its place is free." />
      ) : (
        <Searched items={places} label="Name of the place" one="place" textsOf={({ name }) => [name]}>
          {(found) => (
            <PlacesTable places={found} mayChange={gate.may} onEdit={({ id }) => go(`/workshop/places/${id}`)} />
          )}
        </Searched>
      )}
    </SectionBlock>
  );
}
