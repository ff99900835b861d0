import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { isProblem, sentenceOf } from '@/shared/client/api-problem';
import { useChargeActs } from '@/shared/client/charge-acts';
import { useCharge } from '@/shared/client/charges';
import { serverTimeOf, useNow } from '@/shared/client/clock';
import { useDraft } from '@/shared/client/drafts';
import { knownAt, useLink } from '@/shared/client/link';
import { useMeters } from '@/shared/client/meters';
import { useModuleType } from '@/shared/client/module-types';
import { usePeople } from '@/shared/client/people';
import { usePlan } from '@/shared/client/plans';
import { useCan, useMember } from '@/shared/client/session';
import { useWaiting } from '@/shared/client/waiting/waiting';
import { useWorkshop } from '@/shared/client/workshop';
import type { ChargeDto } from '@/shared/contract/charge';
import { ChannelsPart } from '@/shared/screens/charge/channels-part';
import { ChargeMissing } from '@/shared/ui/charge/charge-missing';
import { isOutside, type LiveAct } from '@/shared/ui/charge/live-acts';
import { LiveScreen } from '@/shared/ui/charge/live-screen';
import type { LiveSheet } from '@/shared/ui/charge/live-sheets';
import { noEndDraft } from '@/shared/ui/charge/end-sheet';
import { noStopDraft } from '@/shared/ui/charge/stop-sheet';
import { soonestTopUp, topUpPath, topUpRequest } from '@/shared/ui/charge/top-up';
import { clock } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { editPath } from '@/shared/ui/waiting/waiting-items';
import { useState } from 'react';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** One charge, live. */
export default function Charge() {
  const { id } = useLocalSearchParams<{ id: string }>();
  const router = useRouter();
  const query = useCharge(id);
  const { zone, marks } = useFormats();
  const now = useNow(1000);
  const back = () => (router.canGoBack() ? router.back() : router.replace('/bench' as Href));
  if (query.data)
    return (
      <Live
        charge={query.data}
        at={{ now, asOf: serverTimeOf(query.dataUpdatedAt) }}
        onBack={back}
        onRead={() => void query.refetch()}
      />
    );
  return (
    <Screen header={<HeaderBar title="Charge" onBack={back} clock={clock(now, zone, marks)} />}>
      <ChargeMissing
        gone={isProblem(query.error) && query.error.status === 404}
        problem={query.isError ? sentenceOf(query.error) : null}
        busy={query.isFetching}
        onRetry={() => void query.refetch()}
        onBack={back}
      />
    </Screen>
  );
}

function Live({
  charge,
  at,
  onBack,
  onRead,
}: {
  charge: ChargeDto;
  at: { now: number; asOf: number };
  onBack: () => void;
  onRead: () => void;
}) {
  const router = useRouter();
  const link = useLink();
  const member = useMember();
  const maySendOthers = useCan('charge:assign');
  const [sheet, setSheet] = useState<LiveSheet | null>(null);
  const stopDraft = useDraft(`stop.${charge.id}`, noStopDraft);
  const endDraft = useDraft(`end.${charge.id}`, noEndDraft);
  const done = () => {
    setSheet(null);
    // The next hold has its own reason: nothing of this one stands there already.
    stopDraft.clear();
    endDraft.clear();
  };
  const acts = useChargeActs(charge, done, onRead);
  const people = usePeople().data;
  const meters = useMeters().data ?? [];
  const workshop = useWorkshop().data;
  const type = useModuleType(charge.moduleTypeId).data;
  const here = useWaiting(charge.id);
  const plan = usePlan(isOutside(charge) ? topUpRequest(charge) : null);
  const go = (path: string) => router.push(path as Href);
  const open = (next: LiveSheet) => {
    acts.forget();
    setSheet(next);
  };
  const act = (kind: LiveAct) => {
    acts.forget();
    if (kind === 'log' || kind === 'checks' || kind === 'check' || kind === 'label')
      go(`/charges/${charge.id}/${kind}`);
    else if (kind === 'top-up') go(topUpPath(charge));
    else if (kind === 'resume') acts.resume();
    else open(kind);
  };
  return (
    <LiveScreen
      charge={charge}
      at={at}
      knownAt={knownAt(link, at.asOf)}
      lagLimitVolts={workshop === undefined ? undefined : workshop.lagLimitMillivolts / 1000}
      type={type}
      people={people}
      meters={meters}
      mayHandOver={maySendOthers || charge.person === null || charge.person.id === member.person.id}
      channels={<ChannelsPart charge={charge} now={at.now} offline={link.state === 'down'} />}
      acts={acts}
      sheet={sheet}
      stopDraft={stopDraft}
      endDraft={endDraft}
      waiting={here.waiting}
      waitingActs={{
        onRemove: (key) => void here.remove(key),
        onSettle: (key, when) => void here.settle(key, when),
        onEdit: (item) => go(editPath(item) ?? `/charges/${charge.id}`),
      }}
      topUp={isOutside(charge) ? soonestTopUp(plan.data?.plan) : null}
      onBack={onBack}
      onGo={go}
      onAct={act}
      onSheet={(next) => (next === null ? setSheet(null) : open(next))}
    />
  );
}
