import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { View } from 'react-native';
import { sentenceOf } from '@/shared/client/api-problem';
import { useNow } from '@/shared/client/clock';
import { useGate } from '@/shared/client/gate';
import { useRepair } from '@/shared/client/repairs';
import type { RepairPageDto } from '@/shared/contract/repair';
import { HandOverPart } from '@/shared/screens/repair/hand-over-part';
import { millivolts } from '@/shared/ui/format/quantities';
import { fitVerdict, forecastWords, spreadLog } from '@/shared/ui/pack-reading/prove-words';
import { SpreadBars } from '@/shared/ui/pack-reading/spread-bars';
import { Button } from '@/shared/ui/primitives/button';
import { CallOut } from '@/shared/ui/primitives/call-out';
import { FactList } from '@/shared/ui/primitives/fact-list';
import { Txt } from '@/shared/ui/primitives/txt';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { Empty } from '@/shared/ui/states/empty';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Forbidden } from '@/shared/ui/states/forbidden';
import { Loading } from '@/shared/ui/states/loading';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** The spread over the readings, and how many balance charges are still to come. */
export default function Prove() {
  const { id } = useLocalSearchParams<{ id: string }>();
  const router = useRouter();
  const repair = useRepair(id);
  const gate = useGate('repair:read');
  const page = `/repairs/${id}`;
  const back = () => (router.canGoBack() ? router.back() : router.replace(page as Href));
  return (
    <Screen
      single
      header={
        <HeaderBar
          title="Prove"
          sub={repair.data ? `${repair.data.number} · ${repair.data.vehicle}` : undefined}
          onBack={back}
        />
      }
    >
      {!gate.may ? (
        <Forbidden what="Repairs are read" roles={gate.roles} people={gate.people} />
      ) : repair.data ? (
        <View style={{ rowGap: 24 }}>
          <Proof repair={repair.data} onRead={() => router.push(`${page}/reading` as Href)} />
          <HandOver repair={repair.data} />
        </View>
      ) : repair.isError ? (
        <ErrorState
          failed="The repair could not be read."
          toDo={sentenceOf(repair.error)}
          action={{ title: 'Try again', onPress: () => void repair.refetch(), busy: repair.isFetching }}
        />
      ) : (
        <Loading what="the repair" onRetry={() => void repair.refetch()} />
      )}
    </Screen>
  );
}

function HandOver({ repair }: { repair: RepairPageDto }) {
  const now = useNow(60_000);
  return <HandOverPart repair={repair} now={now} mayWrite={useGate('repair:write').may} />;
}

/** Spread that a repair is proven at where no forecast names another, mV. */
const AIM_MILLIVOLTS = 10;

function Proof({ repair, onRead }: { repair: RepairPageDto; onRead: () => void }) {
  const now = useNow(60_000);
  const log = spreadLog(repair.readings);
  const last = log.at(-1);
  if (!last)
    return (
      <Empty sentence="No reading of this pack yet." action={{ title: 'Enter the group voltages', onPress: onRead }} />
    );
  const { forecast } = repair;
  const aim = forecast?.aimMillivolts ?? AIM_MILLIVOLTS;
  const verdict = fitVerdict(log, repair.expectedAfterFit);
  const toCome = forecast ? forecastWords(forecast) : null;
  return (
    <View style={{ rowGap: 14 }}>
      <View>
        <Txt kind="small" tone="ink2">
          Spread now
        </Txt>
        <Txt kind="hero">{millivolts(last.spreadMillivolts / 1000)}</Txt>
      </View>
      {toCome && !toCome.converges ? (
        <CallOut tone="red" label="Does not converge">
          <Txt>{toCome.text}</Txt>
        </CallOut>
      ) : null}
      <FactList
        facts={[
          { name: 'Aim, the ink line', value: millivolts(aim / 1000) },
          ...(toCome?.converges ? [{ name: 'Balance charges to come', value: toCome.text }] : []),
        ]}
      />
      {verdict ? <Txt tone={verdict.good ? 'ink' : 'alarm'}>{verdict.text}</Txt> : null}
      <SpreadBars log={log} aimMillivolts={aim} now={now} />
      <Button title="Read the pack again" onPress={onRead} />
    </View>
  );
}
