import { useState } from 'react';
import { View } from 'react-native';
import { useNow } from '@/shared/client/clock';
import { useGate } from '@/shared/client/gate';
import { useLink } from '@/shared/client/link';
import type { RepairPageDto } from '@/shared/contract/repair';
import { HandOverPart } from '@/shared/screens/repair/hand-over-part';
import { HandOverSheet } from '@/shared/screens/repair/hand-over-sheet';
import { useFormats } from '@/shared/ui/format/formats';
import { millivolts } from '@/shared/ui/format/quantities';
import { fitVerdict, forecastFrom, forecastWords, spreadBars, spreadLog } from '@/shared/ui/pack-reading/prove-words';
import { SpreadChart } from '@/shared/ui/pack-reading/spread-chart';
import { Button } from '@/shared/ui/primitives/button';
import { CallOut } from '@/shared/ui/primitives/call-out';
import { Num } from '@/shared/ui/primitives/num';
import { Txt } from '@/shared/ui/primitives/txt';
import { ButtonRow, Foot } from '@/shared/ui/screen/foot';
import { Empty } from '@/shared/ui/states/empty';
import { StepScreen } from './step-screen';

/** The spread over the readings against its aim, and how many balance charges are still to come. */
export function ProveRepair({
  repair,
  onBack,
  onRead,
}: {
  repair: RepairPageDto;
  onBack: () => void;
  onRead: () => void;
}) {
  const now = useNow(60_000);
  const { marks } = useFormats();
  const gate = useGate('repair:write');
  const offline = useLink().state === 'down';
  const [handsOver, setHandsOver] = useState(false);
  const log = spreadLog(repair.readings);
  const last = log.at(-1);
  if (!last)
    return (
      <StepScreen title="Prove" repair={repair} onBack={onBack}>
        <Empty
          sentence="No reading of this pack yet."
          action={{ title: 'Enter the group voltages', onPress: onRead }}
        />
      </StepScreen>
    );
  const { forecast } = repair;
  const aim = repair.pack.aimMillivolts;
  const from = forecast ? forecastFrom(forecast, repair.pack, marks) : null;
  const verdict = fitVerdict(log, repair.expectedAfterFit);
  const toCome = forecast ? forecastWords(forecast) : null;
  const open = repair.state === 'open' && gate.may;
  const proven = repair.steps.every(({ state }) => state === 'done');
  return (
    <StepScreen
      title="Prove"
      repair={repair}
      onBack={onBack}
      foot={
        open ? (
          <Foot note={offline ? 'No connection: it is handed over when it is back.' : undefined} noteId="prove-why">
            <ButtonRow>
              <Button
                title="Hand it over"
                look={proven ? 'primary' : 'line'}
                grow={proven}
                disabled={offline}
                describedBy="prove-why"
                onPress={() => setHandsOver(true)}
              />
              <Button title="Read the pack again" look={proven ? 'line' : 'primary'} grow={!proven} onPress={onRead} />
            </ButtonRow>
          </Foot>
        ) : undefined
      }
    >
      <View style={{ flexDirection: 'row', flexWrap: 'wrap', columnGap: 32, rowGap: 12 }}>
        <Figure name="Spread now" value={String(Math.round(last.spreadMillivolts))} unit="mV">
          {`aim ${millivolts(aim / 1000)}, the ink line`}
        </Figure>
        {toCome?.converges ? (
          <View style={{ flexGrow: 1, flexBasis: 140 }}>
            <Txt kind="small" tone="ink2">
              Balance charges to come
            </Txt>
            <Txt kind={forecast?.charges ? 'numL' : 'body'}>{toCome.text}</Txt>
          </View>
        ) : null}
      </View>
      {toCome && !toCome.converges ? (
        <CallOut tone="red" label="Does not converge">
          <Txt>{toCome.text}</Txt>
        </CallOut>
      ) : null}
      {verdict ? <Txt tone={verdict.good ? 'ink' : 'alarm'}>{verdict.text}</Txt> : null}
      <SpreadChart bars={spreadBars(log, forecast)} aimMillivolts={aim} now={now} />
      {from ? <Txt tone="ink2">{from}</Txt> : null}
      <HandOverPart repair={repair} now={now} mayWrite={gate.may} />
      {handsOver ? <HandOverSheet repair={repair} onClose={() => setHandsOver(false)} /> : null}
    </StepScreen>
  );
}

function Figure({ name, value, unit, children }: { name: string; value: string; unit: string; children: string }) {
  return (
    <View style={{ flexGrow: 1, flexBasis: 140 }}>
      <Txt kind="small" tone="ink2">
        {name}
      </Txt>
      <Num kind="hero" value={value} unit={unit} />
      <Txt kind="small" tone="ink2">
        {children}
      </Txt>
    </View>
  );
}
