import { useState } from 'react';
import { View } from 'react-native';
import { useGate } from '@/shared/client/gate';
import { useLink } from '@/shared/client/link';
import type { RepairPageDto } from '@/shared/contract/repair';
import type { CardClock } from '@/shared/ui/charge/card-model';
import { clock, dateLong, moment } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { dayOf, daysBetween } from '@/shared/ui/format/zone';
import { Button } from '@/shared/ui/primitives/button';
import { IconButton } from '@/shared/ui/primitives/icon-button';
import { Rule } from '@/shared/ui/primitives/rule';
import { Txt } from '@/shared/ui/primitives/txt';
import { BlockCallOut } from '@/shared/ui/repair/block-call-out';
import { ChargePart } from '@/shared/ui/repair/charge-part';
import { EventsPart } from '@/shared/ui/repair/events-part';
import { FactsPart } from '@/shared/ui/repair/facts-part';
import { PackHead } from '@/shared/ui/repair/pack-head';
import { ReadingsPart } from '@/shared/ui/repair/readings-part';
import { FittedPart } from '@/shared/ui/repair/fitted-part';
import { RemovedPart } from '@/shared/ui/repair/removed-part';
import { packWords, standing, unrecorded, vehicleAndBay } from '@/shared/ui/repair/repair-words';
import { SourceLine } from '@/shared/ui/repair/source-line';
import { StepStrip } from '@/shared/ui/repair/step-strip';
import { WaitPart } from '@/shared/ui/repair/wait-part';
import { Columns } from '@/shared/ui/screen/columns';
import { Foot } from '@/shared/ui/screen/foot';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { Surface } from '@/shared/ui/theme/surface';
import { useBreakpoint } from '@/shared/ui/theme/use-breakpoint';
import { RepairWorkPart } from '../work/repair-work-part';
import { CustomerPart } from './customer-part';
import { HandOverPart } from './hand-over-part';
import { NextButton } from './next-button';
import { PhotosPart } from './photos-part';
import { RepairMenu } from './repair-menu';
import { SeasonPart } from './season-part';
import { RepairSheets, type OpenSheet } from './repair-sheets';

/** One repair: where it stands among its seven steps, what the pack reads, its charge, and the one thing to do next. */
export function RepairPage({
  repair,
  at,
  onBack,
  onGo,
}: {
  repair: RepairPageDto;
  at: CardClock;
  onBack: () => void;
  onGo: (path: string) => void;
}) {
  const { zone, marks } = useFormats();
  const { now } = at;
  const wide = useBreakpoint() === 'wide';
  const offline = useLink().state === 'down';
  const gate = useGate('repair:decide');
  const mayAdvise = useGate('repair:write').may;
  const [menu, setMenu] = useState(false);
  const [sheet, setSheet] = useState<OpenSheet | null>(null);
  const [chosen, setChosen] = useState<string | null>(null);
  const open = repair.state === 'open';
  const mayWrite = !offline && (open || repair.state === 'handed-over');
  const latest = standing(repair.readings)[0] ?? repair.readings[0] ?? null;
  const shown = repair.readings.find(({ id }) => id === chosen) ?? latest;
  const people = gate.people.length > 0 ? ` (${gate.people.join(', ')})` : '';
  const deciders = gate.may ? null : `${gate.roles}${people}`;
  const next = (
    <NextButton
      repair={repair}
      mayDecide={gate.may}
      offline={offline}
      onGo={onGo}
      onHandOver={() => setSheet({ kind: 'hand-over' })}
      onRemoved={() => setSheet({ kind: 'removed' })}
      onFit={() => setSheet({ kind: 'fit' })}
    />
  );
  const readings = (
    <ReadingsPart
      repair={repair}
      shown={shown?.id ?? null}
      now={now}
      onShow={setChosen}
      onSetAside={open && !offline ? (reading) => setSheet({ kind: 'set-aside', reading }) : null}
    />
  );
  const photos = <PhotosPart repair={repair} now={now} offline={offline} mayWrite={mayWrite} />;
  const tail = (
    <>
      <FittedPart fitted={repair.fittedAsItIs} now={now} />
      <RemovedPart
        removed={repair.removed}
        missing={unrecorded(repair)}
        now={now}
        onRecord={mayWrite && mayAdvise ? () => setSheet({ kind: 'removed' }) : null}
      />
      <HandOverPart repair={repair} now={now} mayWrite={mayAdvise} />
      <RepairWorkPart repair={repair} now={now} onGo={onGo} />
      <WaitPart
        waits={repair.wait}
        now={now}
        onCorrect={mayWrite ? (wait) => setSheet({ kind: 'wait', wait }) : null}
      />
      <SeasonPart repairId={repair.id} />
    </>
  );
  const booked = Date.parse(repair.bookedAt);
  const since = `${daysBetween(dayOf(booked, zone), dayOf(now, zone)) === 0 ? 'today ' : ''}${moment(booked, zone, now, marks)}`;
  const customer = <CustomerPart repair={repair} offline={offline} />;
  return (
    <Screen
      header={
        <HeaderBar
          title={repair.number}
          sub={`${vehicleAndBay(repair)} · ${wide ? packWords(repair.pack) : `in since ${since}`}`}
          onBack={onBack}
          clock={wide ? clock(now, zone, marks) : undefined}
          tools={<IconButton icon="more" label="More for this repair" onPress={() => setMenu(true)} />}
          action={
            open ? (
              <Button
                look="line"
                size="small"
                title="New pack reading"
                onPress={() => onGo(`/repairs/${repair.id}/reading`)}
              />
            ) : undefined
          }
        />
      }
      foot={wide ? undefined : <Foot>{next}</Foot>}
    >
      <View style={{ rowGap: 18, paddingTop: 4 }}>
        <StepStrip repair={repair} deciders={repair.block?.role && !gate.may ? gate.roles : null} />
        <Columns
          order={['work', 'side', 'facts']}
          facts={
            <View style={{ rowGap: 24 }}>
              <FactsPart repair={repair} now={now} />
              {wide ? readings : null}
            </View>
          }
          work={
            <View style={{ rowGap: 18 }}>
              {repair.block ? <BlockCallOut block={repair.block} deciders={deciders} /> : null}
              {shown ? (
                <PackHead reading={shown} pack={repair.pack} now={now} />
              ) : (
                <Txt>{`The pack was not read yet. It has ${packWords(repair.pack)}.`}</Txt>
              )}
              {repair.sources.length > 0 ? <Rule gap={0} /> : null}
              <SourceLine repair={repair} now={now} />
              {wide ? <EventsPart events={repair.events} now={now} /> : null}
              {wide ? photos : null}
            </View>
          }
          side={
            wide ? (
              <View style={{ rowGap: 24 }}>
                <Surface tone="sheet" style={{ padding: 18, borderRadius: 10, rowGap: 16 }}>
                  {repair.charge ? <ChargePart card={repair.charge} at={at} old={offline} onOpen={onGo} /> : null}
                  <HandedOver repair={repair} />
                  {next}
                </Surface>
                {tail}
                {customer}
              </View>
            ) : (
              <View style={{ rowGap: 24 }}>
                <HandedOver repair={repair} />
                {repair.charge ? <ChargePart card={repair.charge} at={at} old={offline} onOpen={onGo} /> : null}
                {readings}
                {photos}
                {tail}
                <EventsPart events={repair.events} now={now} />
                {customer}
              </View>
            )
          }
        />
      </View>
      {menu ? (
        <RepairMenu
          repair={repair}
          offline={offline}
          onGo={onGo}
          onSheet={(kind) => (kind === 'wait' || kind === 'set-aside' ? undefined : setSheet({ kind }))}
          onClose={() => setMenu(false)}
        />
      ) : null}
      {sheet ? <RepairSheets repair={repair} sheet={sheet} now={now} onClose={() => setSheet(null)} /> : null}
    </Screen>
  );
}

/** Who handed it over, or deleted it, when and why. */
function HandedOver({ repair }: { repair: RepairPageDto }) {
  const { zone, marks } = useFormats();
  const end = repair.deleted ?? repair.handedOver;
  if (!end) return null;
  const at = Date.parse(end.at);
  const words = repair.deleted ? repair.deleted.reason : (repair.handedOver?.note ?? null);
  return (
    <View>
      <Txt
        bold
      >{`${repair.deleted ? 'Deleted' : 'Handed over'} ${dateLong(at, zone)}, ${clock(at, zone, marks)}, ${end.by.name}`}</Txt>
      {words ? <Txt tone="ink2">{words}</Txt> : null}
    </View>
  );
}
