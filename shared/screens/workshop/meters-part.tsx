import { useNow } from '@/shared/client/clock';
import { useGate } from '@/shared/client/gate';
import { useMeters } from '@/shared/client/meters';
import { partState } from '@/shared/client/part-state';
import { Searched } from '@/shared/ui/primitives/searched';
import { whoMay } from '@/shared/ui/workshop/may-change';
import { oldChecks } from '@/shared/ui/workshop/meter-age';
import { SectionBlock } from '@/shared/ui/workshop/section-block';
import { MetersTable } from '@/shared/ui/workshop/small-tables';
import { AddLink } from './add-link';
import type { PartProps } from './part-props';
import { NothingYet, OldChecks } from './part-words';
import { useGo } from './use-go';

/** Meters, their offsets and cross-checks. */
export function MetersPart({ titled }: PartProps) {
  const go = useGo();
  const now = useNow(60_000);
  const gate = useGate('equipment:write');
  const meters = useMeters();
  return (
    <SectionBlock
      id="meters"
      title="Meters"
      titled={titled}
      aside={<AddLink title="add a meter" href="/workshop/meters/new" may={gate.may} />}
      state={partState(meters)}
      what="the meters"
      onRetry={() => void meters.refetch()}
      note={whoMay(gate)}
    >
      {meters.data?.length === 0 ? (
        <NothingYet words="No meter yet. Readings without one widen the band." />
      ) : (
        <Searched items={meters.data ?? []} label="Name of the meter" one="meter" textsOf={({ name }) => [name]}>
          {(found) => (
            <MetersTable
              meters={found}
              now={now}
              mayChange={gate.may}
              onEdit={(meter) => go(`/workshop/meters/${meter.id}`)}
            />
          )}
        </Searched>
      )}
      <OldChecks words={oldChecks(meters.data ?? [], now)} />
    </SectionBlock>
  );
}
