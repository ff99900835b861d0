import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { useState } from 'react';
import { View } from 'react-native';
import { isConflict, isProblem, sentenceOf } from '@/shared/client/api-problem';
import { actProblem } from '@/shared/client/charge-acts';
import { useCharge, useStartCharge } from '@/shared/client/charges';
import { useNow } from '@/shared/client/clock';
import { useContractForm, wrongSentence } from '@/shared/client/forms';
import { useLastMeter } from '@/shared/client/last-meter';
import { useLink } from '@/shared/client/link';
import { useMeters } from '@/shared/client/meters';
import { useModuleType } from '@/shared/client/module-types';
import { useMember } from '@/shared/client/session';
import { useAddSpareReading } from '@/shared/client/spares';
import { useWaiting, useWaitingWrite } from '@/shared/client/waiting/waiting';
import type { ChargeDto, CheckCode, CheckItemDto } from '@/shared/contract/charge';
import { spareReadingSchemaFor } from '@/shared/contract/spare';
import { channelsOf, isToCome } from '@/shared/ui/charge/card-model';
import { ChargeMissing } from '@/shared/ui/charge/charge-missing';
import { useCheckFoot } from '@/shared/ui/charge/check-foot';
import { CheckList } from '@/shared/ui/charge/check-list';
import type { CheckValues } from '@/shared/ui/charge/check-form';
import { Emergency } from '@/shared/ui/charge/emergency';
import { useNextStep } from '@/shared/ui/charge/next-step-box';
import { ReadAgainSheet } from '@/shared/ui/charge/read-again-sheet';
import { WhatToSet } from '@/shared/ui/charge/what-to-set';
import { clock, moment } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { Button } from '@/shared/ui/primitives/button';
import { StandingLine } from '@/shared/ui/primitives/call-out';
import { useToast } from '@/shared/ui/primitives/toast';
import { Columns } from '@/shared/ui/screen/columns';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { WaitingRefused } from '@/shared/ui/waiting/waiting-refused';
import { withWaitingAnswers } from '@/shared/ui/waiting/waiting-items';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** The checks before clipping on, answered one by one and kept with the charge. */
export default function Checks() {
  const { id } = useLocalSearchParams<{ id: string }>();
  const router = useRouter();
  const query = useCharge(id);
  const { zone, marks } = useFormats();
  const now = useNow(1000);
  const back = () => (router.canGoBack() ? router.back() : router.replace(`/charges/${id}` as Href));
  if (query.data) return <Sheet charge={query.data} now={now} onBack={back} onRead={() => void query.refetch()} />;
  return (
    <Screen single header={<HeaderBar title="Before clipping on" onBack={back} clock={clock(now, zone, marks)} />}>
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

function Sheet({
  charge,
  now,
  onBack,
  onRead,
}: {
  charge: ChargeDto;
  now: number;
  onBack: () => void;
  onRead: () => void;
}) {
  const router = useRouter();
  const toast = useToast();
  const { zone, marks } = useFormats();
  const offline = useLink().state === 'down';
  const type = useModuleType(charge.moduleTypeId).data;
  const { person } = useMember();
  const here = useWaiting(charge.id);
  const checks = withWaitingAnswers(charge.checks, here.waiting, person);
  const answer = useWaitingWrite();
  const give = (item: CheckItemDto, given: 'yes' | 'no') =>
    answer.mutate(
      {
        kind: 'answer',
        chargeId: charge.id,
        title: charge.title,
        said: `${item.title}: ${item[given]}`,
        input: { code: item.code, answer: given, asked: item.question },
      },
      { onSuccess: () => setChanging(null) },
    );
  const start = useStartCharge();
  const [changing, setChanging] = useState<CheckCode | null>(null);
  const [reading, setReading] = useState(false);
  const [problem, setProblem] = useState<string | null>(null);
  const closed = !isToCome(charge);
  const live = `/charges/${charge.id}`;
  const begin = () => {
    setProblem(null);
    start.mutate(
      { id: charge.id, rev: charge.rev },
      {
        onSuccess: () => {
          toast({ text: 'The timer runs.' });
          router.replace(live as Href);
        },
        onError: (error) => {
          setProblem(actProblem(error));
          // Taken, changed or ruled out meanwhile: the sheet shows it as it stands.
          if (isConflict(error) || (isProblem(error) && error.status === 422)) onRead();
        },
      },
    );
  };
  const clipOn = useCheckFoot({
    charge,
    offline,
    busy: start.isPending,
    problem,
    onStart: begin,
    onWayOut: (way) => (way.kind === 'plan' ? router.push(way.path as Href) : setReading(true)),
  });
  const over = useNextStep({
    problem: null,
    note: 'The timer was started. The answers stand as they were given.',
    noteId: 'checks-over',
    children: <Button title="Open the charge" onPress={() => router.replace(live as Href)} />,
  });
  const next = closed ? over : clipOn;
  const channel = channelsOf(charge);
  return (
    <Screen
      header={
        <HeaderBar
          title="Before clipping on"
          sub={[
            charge.title,
            `${charge.spare.label}${channel ? ` at ${channel}` : ''}`,
            `clip on ${moment(Date.parse(charge.clipOnAt), zone, now, marks)}`,
          ].join(' · ')}
          onBack={onBack}
        />
      }
      foot={next.foot}
    >
      <Columns
        work={
          <>
            {here.waiting.map((item) => (
              <WaitingRefused
                key={item.key}
                item={item}
                now={now}
                onRemove={(key) => void here.remove(key)}
                onSettle={(key, at) => void here.settle(key, at)}
                onEdit={(one) => {
                  if (one.kind === 'answer') setChanging(one.input.code);
                  void here.remove(one.key);
                }}
              />
            ))}
            <CheckList
              checks={checks}
              changing={changing}
              now={now}
              busy={answer.isPending}
              disabled={false}
              problem={answer.error ? sentenceOf(answer.error) : null}
              closed={closed}
              onChange={(code) => {
                answer.reset();
                setChanging(code);
              }}
              onAnswer={(code, given) => {
                const item = charge.checks.find((one) => one.code === code);
                if (item) give(item, given);
              }}
            />
          </>
        }
        side={
          <>
            <WhatToSet charge={charge} now={now} />
            <View style={{ marginTop: 16 }}>
              <Emergency charge={charge} chemistry={type?.chemistry ?? null} />
            </View>
            <StandingLine style={{ marginTop: 16 }} />
            {next.side}
          </>
        }
      />
      {reading ? <ReadAgain charge={charge} onRead={onRead} onClose={() => setReading(false)} /> : null}
    </Screen>
  );
}

/** A new reading of the spare, which the numbers of the checks go by. */
function ReadAgain({ charge, onRead, onClose }: { charge: ChargeDto; onRead: () => void; onClose: () => void }) {
  const meters = useMeters().data ?? [];
  const add = useAddSpareReading();
  const meter = useLastMeter();
  const initial: CheckValues = {
    groupVolts: charge.groups.map(() => ''),
    celsius: '',
    // The pack's own is best; else the one this person reads with.
    meterId: charge.meterId ?? (meter.firstOf(meters) || null),
  };
  const f = useContractForm({
    schema: spareReadingSchemaFor({ ...charge, groupsInSeries: charge.groups.length }),
    initial,
    draft: `read-again.${charge.id}`,
    send: async (output) => {
      await add.mutateAsync({ id: charge.spare.id, ...output });
      meter.keep(output.meterId);
      onRead();
      onClose();
    },
  });
  return (
    <ReadAgainSheet
      charge={charge}
      form={f.form}
      meters={meters}
      busy={f.busy}
      problem={f.problem}
      wrong={f.wrong > 0 ? wrongSentence(f.wrong) : null}
      onSend={() => void f.submit()}
      onClose={onClose}
    />
  );
}
