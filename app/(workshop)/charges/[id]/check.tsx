import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { useRef, useState } from 'react';
import { isConflict, isProblem, sentenceOf } from '@/shared/client/api-problem';
import { actProblem } from '@/shared/client/charge-acts';
import { useCharge } from '@/shared/client/charges';
import { useNow } from '@/shared/client/clock';
import { useContractForm, wrongSentence } from '@/shared/client/forms';
import { useLink } from '@/shared/client/link';
import { useMeters } from '@/shared/client/meters';
import { useModuleType } from '@/shared/client/module-types';
import { useSpare } from '@/shared/client/spares';
import { useWaiting } from '@/shared/client/waiting/waiting';
import type { ChargeDto } from '@/shared/contract/charge';
import { restCheckSchemaFor } from '@/shared/contract/rest-check';
import { ChargeMissing } from '@/shared/ui/charge/charge-missing';
import { checkOf, emptyCheck } from '@/shared/ui/charge/check-form';
import { CheckScreen } from '@/shared/ui/charge/check-screen';
import { topUpPath } from '@/shared/ui/charge/top-up';
import { clock } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { Button } from '@/shared/ui/primitives/button';
import { useToast } from '@/shared/ui/primitives/toast';
import { Txt } from '@/shared/ui/primitives/txt';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** The check after the rest: group voltages in, judged as they are typed; `?waiting=` one that is not sent yet. */
export default function Check() {
  const { id, waiting } = useLocalSearchParams<{ id: string; waiting?: string }>();
  const router = useRouter();
  const query = useCharge(id);
  const { zone, marks } = useFormats();
  const now = useNow(1000);
  const back = () => (router.canGoBack() ? router.back() : router.replace(`/charges/${id}` as Href));
  const charge = query.data;
  if (charge && (charge.stage === 'resting' || charge.stage === 'check-due'))
    return (
      <Form charge={charge} waitingKey={waiting ?? null} now={now} onBack={back} onRead={() => void query.refetch()} />
    );
  return (
    <Screen single header={<HeaderBar title="Check after rest" onBack={back} clock={clock(now, zone, marks)} />}>
      {charge ? (
        <>
          <Txt style={{ marginVertical: 16 }}>
            {charge.stage === 'ready' || charge.stage === 'fitted'
              ? `${charge.title} is checked and in tolerance.`
              : 'The check comes after the current has ended and the module has rested.'}
          </Txt>
          <Button look="line" title="Open the charge" onPress={() => router.replace(`/charges/${charge.id}` as Href)} />
        </>
      ) : (
        <ChargeMissing
          gone={isProblem(query.error) && query.error.status === 404}
          problem={query.isError ? sentenceOf(query.error) : null}
          busy={query.isFetching}
          onRetry={() => void query.refetch()}
          onBack={back}
        />
      )}
    </Screen>
  );
}

function Form({
  charge,
  waitingKey,
  now,
  onBack,
  onRead,
}: {
  charge: ChargeDto;
  /** One that waits on this device and is typed anew. */
  waitingKey: string | null;
  now: number;
  onBack: () => void;
  onRead: () => void;
}) {
  const router = useRouter();
  const toast = useToast();
  const { marks } = useFormats();
  const offline = useLink().state === 'down';
  const meters = useMeters().data ?? [];
  const type = useModuleType(charge.moduleTypeId).data;
  const spare = useSpare(charge.spare.id).data;
  const { waiting, write, replace } = useWaiting(charge.id);
  const [anew] = useState(() => {
    const found = waiting.find((one) => one.key === waitingKey);
    return found?.kind === 'rest-check' ? found : null;
  });
  const wantsTopUp = useRef(false);
  const window = { ...charge, groupsInSeries: charge.groups.length };
  const initial = anew ? checkOf(anew.input, charge.groups.length, marks) : emptyCheck(charge);
  const f = useContractForm({
    schema: restCheckSchemaFor(window, charge.toleranceVolts),
    initial,
    draft: anew ? `waiting.${anew.key}` : `check.${charge.id}`,
    send: async (output) => {
      const seen = { rev: charge.rev, checks: charge.restChecks.length };
      if (anew && waiting.some(({ key }) => key === anew.key)) {
        await replace(anew.key, { ...seen, input: { ...output, at: output.at ?? anew.input.at } });
        toast({ text: 'Kept anew. It is sent when the connection is there.' });
        router.replace(`/charges/${charge.id}` as Href);
        return;
      }
      const draft = { kind: 'rest-check', chargeId: charge.id, title: charge.title, ...seen, input: output } as const;
      const checked = await write(draft).catch((error: unknown) => {
        // Somebody else was first: the screen shows the charge as it stands.
        if (isConflict(error)) onRead();
        throw error;
      });
      if (checked === null) {
        toast({ text: 'The check is kept on this device until the connection is back.' });
        router.replace(`/charges/${charge.id}` as Href);
        return;
      }
      const within = checked.restChecks.at(-1)?.verdict.within ?? false;
      if (within) toast({ text: `${charge.title} is ready.` });
      // Back leads to the charge and not into this form again.
      router.replace(`/charges/${charge.id}` as Href);
      if (!within && wantsTopUp.current) router.push(topUpPath(checked) as Href);
    },
  });
  const submit = (topUp: boolean) => {
    wantsTopUp.current = topUp;
    void f.submit();
  };
  return (
    <CheckScreen
      charge={charge}
      now={now}
      form={f.form}
      meters={meters}
      chemistry={type?.chemistry ?? null}
      capacityAh={spare?.usedCapacityAh ?? null}
      offline={offline}
      busy={f.busy}
      problem={f.problem !== null && isConflict(f.error) ? actProblem(f.error) : f.problem}
      wrong={f.wrong > 0 ? wrongSentence(f.wrong) : null}
      onBack={onBack}
      onSave={() => submit(false)}
      onTopUp={() => submit(true)}
    />
  );
}
