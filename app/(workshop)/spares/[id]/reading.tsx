import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { useMemo } from 'react';
import { useController } from 'react-hook-form';
import { View } from 'react-native';
import { sentenceOf } from '@/shared/client/api-problem';
import { serverNow, useNow } from '@/shared/client/clock';
import { useContractForm, wrongSentence } from '@/shared/client/forms';
import { useLastMeter } from '@/shared/client/last-meter';
import { useLink } from '@/shared/client/link';
import { useMeters } from '@/shared/client/meters';
import { useAddSpareReading, useSpare } from '@/shared/client/spares';
import type { MeterDto } from '@/shared/contract/equipment';
import type { SpareDto } from '@/shared/contract/spare';
import { age, clock } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { voltsNumber } from '@/shared/ui/format/quantities';
import { dayOf } from '@/shared/ui/format/zone';
import { DateTimeField } from '@/shared/ui/primitives/date-time-field';
import { Field } from '@/shared/ui/primitives/field';
import { Txt } from '@/shared/ui/primitives/txt';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { FormFoot } from '@/shared/ui/spare/form-foot';
import { ReadingFields } from '@/shared/ui/spare/reading-fields';
import { blockedBecause } from '@/shared/ui/spare/spare-foot';
import { emptyReading, readingForm, readingInput, type DatedReadingTyped } from '@/shared/ui/spare/spare-form';
import { TypedField } from '@/shared/ui/spare/typed-field';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Loading } from '@/shared/ui/states/loading';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** Enters what the groups of a spare read at rest. */
export default function SpareReading() {
  const { id } = useLocalSearchParams<{ id: string }>();
  const router = useRouter();
  const spare = useSpare(id);
  const meters = useMeters();
  const back = () => (router.canGoBack() ? router.back() : router.replace(`/spares/${id}` as Href));
  if (spare.data && !meters.isPending)
    return <Form key={id} spare={spare.data} meters={meters.data ?? []} onBack={back} />;
  return (
    <Screen single header={<HeaderBar title="Enter a reading" onBack={back} />}>
      {spare.isError ? (
        <ErrorState
          failed="The spare could not be read."
          toDo={sentenceOf(spare.error)}
          action={{ title: 'Try again', onPress: () => void spare.refetch(), busy: spare.isFetching }}
        />
      ) : (
        <Loading what="the spare" onRetry={() => void spare.refetch()} />
      )}
    </Screen>
  );
}

function Form({ spare, meters, onBack }: { spare: SpareDto; meters: readonly MeterDto[]; onBack: () => void }) {
  const { zone, marks } = useFormats();
  const now = useNow(60_000);
  const today = dayOf(now, zone);
  const add = useAddSpareReading();
  const meter = useLastMeter();
  const offline = useLink().state === 'down';
  const schema = useMemo(() => readingForm(spare, { zone, now: serverNow }), [spare, zone]);
  const initial = useMemo<DatedReadingTyped>(
    () => ({ ...emptyReading(spare.groupsInSeries, meter.firstOf(meters)), day: today, time: '' }),
    // What stands there at first; a reading that arrives meanwhile must not empty the form.
    // eslint-disable-next-line react-hooks/exhaustive-deps
    [spare.id],
  );
  const f = useContractForm({
    schema,
    initial,
    draft: `spare.reading.${spare.id}`,
    send: async (output) => {
      await add.mutateAsync({ id: spare.id, ...readingInput(output, zone) });
      meter.keep(output.meterId);
      onBack();
    },
  });
  const day = useController({ control: f.form.control, name: 'day' });
  const time = useController({ control: f.form.control, name: 'time' });
  const blocked = blockedBecause(spare);
  const last = spare.reading;
  return (
    <Screen
      single
      header={
        <HeaderBar title={`Read ${spare.label}`} sub={spare.typeName} onBack={onBack} clock={clock(now, zone, marks)} />
      }
      foot={
        <FormFoot
          title="Keep the reading"
          busy={f.busy}
          offline={offline}
          problem={f.problem ?? (f.wrong > 0 ? wrongSentence(f.wrong) : blocked)}
          onSend={() => void f.submit()}
        />
      }
    >
      <View style={{ rowGap: 14, paddingBottom: 16 }}>
        {last ? (
          <Txt kind="small" tone="ink2">
            {`Before, ${agoWords(age(Date.parse(last.at), zone, now))}: ${last.groupVolts.map((volts) => voltsNumber(volts, marks)).join('  ')} V`}
          </Txt>
        ) : null}
        <ReadingFields form={f.form} groups={spare.groupsInSeries} type={spare} meters={meters} />
        <DateTimeField
          label="Read at"
          hint="empty: now"
          from={-30}
          to={0}
          today={today}
          value={{ day: day.field.value, time: time.field.value }}
          error={time.fieldState.error?.message}
          onBlur={time.field.onBlur}
          onChange={(next) => {
            day.field.onChange(next.day);
            time.field.onChange(next.time);
          }}
        />
        <TypedField form={f.form} name="note">
          {(field) => <Field label="Note" maxLength={500} {...field} />}
        </TypedField>
      </View>
    </Screen>
  );
}

/** '12 days ago', 'yesterday' */
const agoWords = (words: string): string => (words.endsWith('days') ? `${words} ago` : words);
