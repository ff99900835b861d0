import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { isProblem, sentenceOf } from '@/shared/client/api-problem';
import { useChargeLog } from '@/shared/client/charge-log';
import { useCharge } from '@/shared/client/charges';
import { useNow } from '@/shared/client/clock';
import { useGate } from '@/shared/client/gate';
import { useLink } from '@/shared/client/link';
import { LogFileBody } from '@/shared/screens/charge-log/log-file-body';
import { isUnderWay } from '@/shared/ui/charge/card-model';
import { ChargeMissing } from '@/shared/ui/charge/charge-missing';
import { addTitle } from '@/shared/ui/charge-log/log-words';
import { clock } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { Button } from '@/shared/ui/primitives/button';
import { useToast } from '@/shared/ui/primitives/toast';
import { Txt } from '@/shared/ui/primitives/txt';
import { Foot } from '@/shared/ui/screen/foot';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** A logger's file for a running charge: chosen, looked at, confirmed. */
export default function LogFile() {
  const { id } = useLocalSearchParams<{ id: string }>();
  const router = useRouter();
  const query = useCharge(id);
  const reading = useChargeLog(id);
  const { zone, marks } = useFormats();
  const now = useNow(60_000);
  const gate = useGate('charge:run');
  const offline = useLink().state === 'down';
  const toast = useToast();
  const charge = query.data;
  const close = () => (router.canGoBack() ? router.back() : router.replace(`/charges/${id}` as Href));
  const title = addTitle(reading.preview);
  const busy = reading.sent !== null;
  const take = async () => {
    const taken = await reading.take();
    if (taken === null) return;
    const [are, readings] = taken.added === 1 ? ['is', 'reading'] : ['are', 'readings'];
    toast({ text: `${taken.added} ${readings} ${are} added. The finish is reckoned from them.` });
    close();
  };
  const open = charge !== undefined && gate.may && isUnderWay(charge);
  return (
    <Screen
      single
      header={<HeaderBar title="A logger’s file" sub={charge?.title} onBack={close} clock={clock(now, zone, marks)} />}
      foot={
        open && reading.preview !== null ? (
          <Foot note={footNote(reading.preview, title)}>
            <Button
              title={title ?? 'Add the readings'}
              onPress={() => void take()}
              disabled={title === null || offline || busy}
              busy={busy}
            />
          </Foot>
        ) : undefined
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
      ) : open ? (
        <LogFileBody charge={charge} reading={reading} offline={offline} now={now} />
      ) : (
        <>
          <Txt style={{ marginVertical: 16 }}>
            {gate.may
              ? 'Readings belong to a charge that is under way. This one is not.'
              : `Readings are added by ${gate.roles}.`}
          </Txt>
          <Button look="line" title="Back to the charge" onPress={close} />
        </>
      )}
    </Screen>
  );
}

const footNote = (preview: { problem: string | null }, title: string | null): string | null => {
  if (preview.problem !== null) return 'Change how it is read first: see above.';
  return title === null ? 'All of its readings are here already.' : null;
};
