import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { actProblem } from '@/shared/client/charge-acts';
import { isConflict, isProblem, sentenceOf } from '@/shared/client/api-problem';
import { useCharge, useCorrectReading } from '@/shared/client/charges';
import { serverNow, serverTimeOf, useNow } from '@/shared/client/clock';
import { useContractForm, wrongSentence } from '@/shared/client/forms';
import { knownAt, useLink } from '@/shared/client/link';
import { useMeters } from '@/shared/client/meters';
import { useModuleType } from '@/shared/client/module-types';
import { useWaiting } from '@/shared/client/waiting/waiting';
import type { WaitingReading } from '@/shared/client/waiting/waiting-write';
import { useWorkshop } from '@/shared/client/workshop';
import type { ChargeDto, ReadingDto, ReadingInput } from '@/shared/contract/charge';
import { channelsOf, isUnderWay } from '@/shared/ui/charge/card-model';
import { CardRibbon } from '@/shared/ui/charge/card-ribbon';
import { ChargeMissing } from '@/shared/ui/charge/charge-missing';
import { LiveHead } from '@/shared/ui/charge/live-head';
import { correctedInstant, emptyLog, logOf, logSchema } from '@/shared/ui/charge/log-form';
import { LogSheet } from '@/shared/ui/charge/log-sheet';
import { clock } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { Button } from '@/shared/ui/primitives/button';
import { useToast } from '@/shared/ui/primitives/toast';
import { Txt } from '@/shared/ui/primitives/txt';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { useState } from 'react';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** The workshop's lag limit until its settings are read, V. */
const usualLagLimitVolts = 0.02;

/** A reading of a running charge over its live screen; `?correct=` puts an old one right, `?waiting=` one that is not sent. */
export default function Log() {
  const { id, correct, waiting } = useLocalSearchParams<{ id: string; correct?: string; waiting?: string }>();
  const router = useRouter();
  const query = useCharge(id);
  const { zone, marks } = useFormats();
  const now = useNow(1000);
  const link = useLink();
  const charge = query.data;
  const close = () => (router.canGoBack() ? router.back() : router.replace(`/charges/${id}` as Href));
  const correcting = charge?.readings.find((reading) => reading.id === correct) ?? null;
  const at = { now, asOf: serverTimeOf(query.dataUpdatedAt) };
  const channel = charge ? channelsOf(charge) : '';
  const may = charge && (correct === undefined ? isUnderWay(charge) : (correcting?.mayCorrect ?? false));
  return (
    <Screen
      single
      header={
        <HeaderBar
          title={charge?.title ?? 'Log a reading'}
          sub={
            charge && [charge.spare.label, charge.typeName, channel && `channel ${channel}`].filter(Boolean).join(' · ')
          }
          onBack={close}
          clock={clock(now, zone, marks)}
        />
      }
    >
      {!charge ? (
        <ChargeMissing
          gone={isProblem(query.error) && query.error.status === 404}
          problem={query.isError ? sentenceOf(query.error) : null}
          busy={query.isFetching}
          onRetry={() => void query.refetch()}
          onBack={close}
        />
      ) : (
        <>
          <LiveHead charge={charge} at={at} knownAt={knownAt(link, at.asOf)} />
          <CardRibbon card={charge} at={at} height={76} />
          {may ? (
            <Sheet charge={charge} correcting={correcting} waitingKey={waiting ?? null} now={now} onClose={close} />
          ) : (
            <NotNow correct={correct !== undefined} onClose={close} />
          )}
        </>
      )}
    </Screen>
  );
}

/** Nothing can be logged here (any more): why, and the way back. */
function NotNow({ correct, onClose }: { correct: boolean; onClose: () => void }) {
  return (
    <>
      <Txt style={{ marginVertical: 16 }}>
        {correct
          ? 'This reading is corrected already, or it is not yours to correct. Its writer or a foreman corrects it.'
          : 'Readings belong to a charge that is under way.'}
      </Txt>
      <Button look="line" title="Back to the charge" onPress={onClose} />
    </>
  );
}

function Sheet({
  charge,
  correcting,
  waitingKey,
  now,
  onClose,
}: {
  charge: ChargeDto;
  correcting: ReadingDto | null;
  /** One that waits on this device and is typed anew. */
  waitingKey: string | null;
  now: number;
  onClose: () => void;
}) {
  const { zone, marks } = useFormats();
  const toast = useToast();
  const offline = useLink().state === 'down';
  const { waiting, write, replace } = useWaiting(charge.id);
  // Read once: it is gone from the list when it is sent meanwhile, and what is typed goes the usual way.
  const [anew] = useState(() => waiting.find((one) => one.kind === 'reading' && one.key === waitingKey) ?? null);
  const correct = useCorrectReading();
  const meters = useMeters().data ?? [];
  const type = useModuleType(charge.moduleTypeId).data;
  const lagMillivolts = useWorkshop().data?.lagLimitMillivolts;
  const count = charge.groups.length;
  const before = correcting ?? (anew?.kind === 'reading' ? asRead(anew) : null);
  const f = useContractForm({
    schema: logSchema({
      window: { ...charge, groupsInSeries: count },
      direction: charge.option.steps[charge.stepIndex]?.direction ?? charge.direction,
      zone,
      now: serverNow,
      ...(before ? { atOf: correctedInstant(before, zone) } : {}),
    }),
    initial: before ? logOf(before, count, zone, marks) : emptyLog(count),
    draft: correcting ? `correct.${correcting.id}` : anew ? `waiting.${anew.key}` : `log.${charge.id}`,
    send: async ({ reason, ...input }) => {
      if (correcting) {
        await correct.mutateAsync({ id: charge.id, readingId: correcting.id, ...input, reason: reason ?? null });
        toast({ text: 'The reading is put right. The old one stays in the log.' });
      } else if (anew && waiting.some(({ key }) => key === anew.key)) {
        await replace(anew.key, { input: { ...input, at: input.at ?? anew.input.at } });
        toast({ text: 'Kept anew. It is sent when the connection is there.' });
      } else {
        const reading = { ...input, at: input.at ?? anew?.input.at } satisfies Partial<ReadingInput>;
        const taken = await write({ kind: 'reading', chargeId: charge.id, title: charge.title, input: reading });
        toast({ text: loggedText(taken) });
      }
      onClose();
    },
  });
  return (
    <LogSheet
      charge={charge}
      form={f.form}
      meters={meters}
      now={now}
      context={{
        lagLimitVolts: lagMillivolts === undefined ? usualLagLimitVolts : lagMillivolts / 1000,
        maxChargeCelsius: type?.maxChargeCelsius ?? null,
        zone,
        now,
        marks,
      }}
      busy={f.busy}
      problem={f.problem !== null && isConflict(f.error) ? actProblem(f.error) : f.problem}
      wrong={f.wrong > 0 ? wrongSentence(f.wrong) : null}
      correcting={correcting}
      offline={offline}
      onSend={() => void f.submit()}
      onClose={onClose}
    />
  );
}

/** A reading that waits here, as its form takes an old one. */
const asRead = ({ input }: WaitingReading) => ({
  at: input.at,
  terminalVolts: input.terminalVolts ?? null,
  amps: input.amps ?? null,
  celsius: input.celsius ?? null,
  groupVolts: input.groupVolts ?? null,
  meterId: input.meterId ?? null,
  takenAt: input.takenAt ?? null,
});

/** @param taken the charge with the reading in it; null: it waits on this device */
function loggedText(taken: ChargeDto | null): string {
  if (taken === null) return 'Kept on this device until the connection is back.';
  return taken.odd === null ? 'Logged. The finish is reckoned from it.' : 'Logged. It does not fit: see what to check.';
}
