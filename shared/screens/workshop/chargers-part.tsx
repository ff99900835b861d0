import { useState } from 'react';
import { View } from 'react-native';
import { sentenceOf } from '@/shared/client/api-problem';
import { useChannelFailed, useChannelWorks } from '@/shared/client/channel-faults';
import { useChargers } from '@/shared/client/chargers';
import { useNow } from '@/shared/client/clock';
import { useGate } from '@/shared/client/gate';
import { useLink } from '@/shared/client/link';
import { useMeters } from '@/shared/client/meters';
import { partState } from '@/shared/client/part-state';
import { useCan } from '@/shared/client/session';
import type { ChannelDto } from '@/shared/contract/equipment';
import { ProblemLine } from '@/shared/ui/auth/problem-line';
import { ChannelFaultSheet } from '@/shared/ui/charge/channel-fault-sheet';
import { Link } from '@/shared/ui/primitives/link';
import { Searched } from '@/shared/ui/primitives/searched';
import { useToast } from '@/shared/ui/primitives/toast';
import { Txt } from '@/shared/ui/primitives/txt';
import { ChargersTable } from '@/shared/ui/workshop/chargers-table';
import { whoMay } from '@/shared/ui/workshop/may-change';
import { oldChecks } from '@/shared/ui/workshop/meter-age';
import { SectionBlock } from '@/shared/ui/workshop/section-block';
import { AddLink } from './add-link';
import type { PartProps } from './part-props';
import { NothingYet, OldChecks } from './part-words';
import { useGo } from './use-go';

/** Chargers with their channels; those out of service in a line of their own. */
export function ChargersPart({ titled }: PartProps) {
  const go = useGo();
  const now = useNow(60_000);
  const gate = useGate('equipment:write');
  const mayFail = useCan('charge:run');
  const mayClear = useCan('charge:assign');
  const offline = useLink().state === 'down';
  const failed = useChannelFailed();
  const works = useChannelWorks();
  const toast = useToast();
  const [asked, setAsked] = useState<ChannelDto | null>(null);
  const chargers = useChargers();
  const meters = useMeters();
  const own = (chargers.data ?? []).filter((charger) => !charger.retired);
  const retired = (chargers.data ?? []).filter((charger) => charger.retired);
  const named = (meters.data ?? []).filter((meter) => own.some((charger) => charger.meterId === meter.id));
  return (
    <SectionBlock
      id="chargers"
      title="Chargers and channels"
      titled={titled}
      aside={<AddLink title="add a charger" href="/workshop/chargers/new" may={gate.may} />}
      state={partState(chargers, meters)}
      what="the chargers"
      onRetry={() => {
        void chargers.refetch();
        void meters.refetch();
      }}
      note={whoMay(gate)}
    >
      {own.length === 0 ? (
        <NothingYet words="No charger yet. Nothing can be planned without one." />
      ) : (
        <Searched
          items={own}
          rows={own.reduce((sum, charger) => sum + charger.channels.length, 0)}
          label="Charger, place or channel"
          one="charger"
          textsOf={({ name, place, channels }) => [name, place, ...channels.map((channel) => channel.name)]}
        >
          {(found) => (
            <ChargersTable
              chargers={found}
              meters={meters.data ?? []}
              now={now}
              mayChange={gate.may}
              mayFail={mayFail}
              mayClear={mayClear}
              disabled={offline}
              onEdit={(charger) => go(`/workshop/chargers/${charger.id}`)}
              onFailed={(channel) => {
                failed.reset();
                setAsked(channel);
              }}
              onWorks={({ id, name }) =>
                works.mutate({ id }, { onSuccess: () => toast({ text: `${name} is in order again.` }) })
              }
            />
          )}
        </Searched>
      )}
      <ProblemLine text={works.error ? sentenceOf(works.error) : null} />
      {asked ? (
        <ChannelFaultSheet
          channels={[asked]}
          busy={failed.isPending}
          problem={failed.error ? sentenceOf(failed.error) : null}
          onClose={() => setAsked(null)}
          onConfirm={(input) => failed.mutate(input, { onSuccess: () => setAsked(null) })}
        />
      ) : null}
      <OldChecks words={oldChecks(named, now)} />
      {retired.length > 0 ? (
        <View style={{ flexDirection: 'row', flexWrap: 'wrap', alignItems: 'center', columnGap: 12 }}>
          <Txt kind="small" tone="ink2">
            Out of service:
          </Txt>
          {retired.map((charger) => (
            <Link
              key={charger.id}
              kind="small"
              title={charger.name}
              href={`/workshop/chargers/${charger.id}`}
              onPress={() => go(`/workshop/chargers/${charger.id}`)}
            />
          ))}
        </View>
      ) : null}
    </SectionBlock>
  );
}
