import { useGate } from '@/shared/client/gate';
import { partState } from '@/shared/client/part-state';
import { useResistors } from '@/shared/client/resistors';
import { Searched } from '@/shared/ui/primitives/searched';
import { whoMay } from '@/shared/ui/workshop/may-change';
import { SectionBlock } from '@/shared/ui/workshop/section-block';
import { ResistorsTable } from '@/shared/ui/workshop/small-tables';
import { AddLink } from './add-link';
import type { PartProps } from './part-props';
import { NothingYet } from './part-words';
import { useGo } from './use-go';

/** Levelling resistors. */
export function ResistorsPart({ titled }: PartProps) {
  const go = useGo();
  const gate = useGate('equipment:write');
  const resistors = useResistors();
  return (
    <SectionBlock
      id="resistors"
      title="Levelling resistors"
      titled={titled}
      aside={<AddLink title="add a resistor" href="/workshop/resistors/new" may={gate.may} />}
      state={partState(resistors)}
      what="the resistors"
      onRetry={() => void resistors.refetch()}
      note={whoMay(gate)}
    >
      {resistors.data?.length === 0 ? (
        <NothingYet words="No levelling resistor yet. Unequal groups are brought level by charging alone." />
      ) : (
        <Searched
          items={resistors.data ?? []}
          label="Name of the resistor"
          one="levelling resistor"
          textsOf={({ name }) => [name]}
        >
          {(found) => (
            <ResistorsTable
              resistors={found}
              mayChange={gate.may}
              onEdit={(resistor) => go(`/workshop/resistors/${resistor.id}`)}
            />
          )}
        </Searched>
      )}
    </SectionBlock>
  );
}
