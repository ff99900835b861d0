import { useGate } from '@/shared/client/gate';
import { useModuleTypes } from '@/shared/client/module-types';
import { partState } from '@/shared/client/part-state';
import { chemistryNames } from '@/shared/contract/equipment';
import { Searched } from '@/shared/ui/primitives/searched';
import { whoMay } from '@/shared/ui/workshop/may-change';
import { SectionBlock } from '@/shared/ui/workshop/section-block';
import { TypesTable } from '@/shared/ui/workshop/types-table';
import { AddLink } from './add-link';
import type { PartProps } from './part-props';
import { NothingYet } from './part-words';
import { useGo } from './use-go';

/** Module types, each with the limits of its maker. */
export function ModuleTypesPart({ titled }: PartProps) {
  const go = useGo();
  const gate = useGate('equipment:write');
  const types = useModuleTypes();
  return (
    <SectionBlock
      id="module-types"
      title="Module types"
      titled={titled}
      aside={<AddLink title="add a type" href="/workshop/module-types/new" may={gate.may} />}
      state={partState(types)}
      what="the module types"
      onRetry={() => void types.refetch()}
      note={whoMay(gate)}
    >
      {types.data?.length === 0 ? (
        <NothingYet words="No module type yet. Every spare is of one." />
      ) : (
        <Searched
          items={types.data ?? []}
          label="Name or chemistry"
          one="module type"
          textsOf={({ name, chemistry }) => [name, chemistryNames[chemistry]]}
        >
          {(found) => <TypesTable types={found} onOpen={(type) => go(`/workshop/module-types/${type.id}`)} />}
        </Searched>
      )}
    </SectionBlock>
  );
}
