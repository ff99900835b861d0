import { useRouter, type Href } from 'expo-router';
import { useMemo, useState } from 'react';
import { useWatch } from 'react-hook-form';
import { View } from 'react-native';
import { sentenceOf } from '@/shared/client/api-problem';
import { useContractForm, wrongSentence } from '@/shared/client/forms';
import { useLastMeter } from '@/shared/client/last-meter';
import { useLink } from '@/shared/client/link';
import { useMeters } from '@/shared/client/meters';
import { useModuleTypes } from '@/shared/client/module-types';
import { useCan } from '@/shared/client/session';
import { useAddSpare } from '@/shared/client/spares';
import type { MeterDto, ModuleTypeDto } from '@/shared/contract/equipment';
import { ScanButton } from '@/shared/screens/scan/scan-button';
import { Link } from '@/shared/ui/primitives/link';
import { Txt } from '@/shared/ui/primitives/txt';
import { HeaderBar } from '@/shared/ui/screen/header-bar';
import { Screen } from '@/shared/ui/screen/screen';
import { FormFoot } from '@/shared/ui/spare/form-foot';
import { ReadingFields } from '@/shared/ui/spare/reading-fields';
import { SpareFields } from '@/shared/ui/spare/spare-fields';
import { emptyReading, emptySpare, newSpareForm, resized, type NewSpareTyped } from '@/shared/ui/spare/spare-form';
import { Empty } from '@/shared/ui/states/empty';
import { ErrorState } from '@/shared/ui/states/error-state';
import { Loading } from '@/shared/ui/states/loading';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

/** Takes a spare in: what it is, and its first reading. */
export default function NewSpare() {
  const router = useRouter();
  const types = useModuleTypes();
  const meters = useMeters();
  const mayAddTypes = useCan('equipment:write');
  const back = () => (router.canGoBack() ? router.back() : router.replace('/spares' as Href));
  if (types.data && types.data.length > 0 && !meters.isPending)
    return <Form types={types.data} meters={meters.data ?? []} onBack={back} />;
  return (
    <Screen single header={<HeaderBar title="Take in a spare" onBack={back} />}>
      {types.data && types.data.length === 0 ? (
        <Empty
          sentence={
            mayAddTypes
              ? 'No module types yet. Add the first one, then its spares.'
              : 'No module types yet. A manager adds them under Workshop.'
          }
          action={
            mayAddTypes
              ? { title: 'Add a module type', onPress: () => router.push('/workshop' as Href) }
              : { title: 'Back', onPress: back }
          }
        />
      ) : types.isError ? (
        <ErrorState
          failed="The module types could not be read."
          toDo={sentenceOf(types.error)}
          action={{ title: 'Try again', onPress: () => void types.refetch(), busy: types.isFetching }}
        />
      ) : (
        <Loading what="the module types" onRetry={() => void types.refetch()} />
      )}
    </Screen>
  );
}

function Form({
  types,
  meters,
  onBack,
}: {
  types: readonly ModuleTypeDto[];
  meters: readonly MeterDto[];
  onBack: () => void;
}) {
  const router = useRouter();
  const add = useAddSpare();
  const meter = useLastMeter();
  const [initial] = useState<NewSpareTyped>(() => ({ ...emptySpare, reading: emptyReading(1, meter.firstOf(meters)) }));
  const offline = useLink().state === 'down';
  const schema = useMemo(() => newSpareForm((id) => types.find((type) => type.id === id)), [types]);
  const f = useContractForm({
    schema,
    initial,
    draft: 'spare.new',
    send: async (output) => {
      const spare = await add.mutateAsync(output);
      meter.keep(output.reading.meterId);
      router.replace(`/spares/${spare.id}` as Href);
    },
  });
  const typeId = useWatch({ control: f.form.control, name: 'moduleTypeId' });
  const type = types.find((each) => each.id === typeId);
  return (
    <Screen
      single
      header={
        <HeaderBar
          title="Take in a spare"
          sub={f.restored ? 'What you typed before is still here.' : 'What it is, and its first reading'}
          onBack={onBack}
          tools={f.restored ? <Link kind="small" align="right" title="Clear" onPress={() => f.clear()} /> : undefined}
        />
      }
      foot={
        <FormFoot
          title="Take it in"
          busy={f.busy}
          offline={offline}
          problem={f.problem ?? (f.wrong > 0 ? wrongSentence(f.wrong) : null)}
          onSend={() => void f.submit()}
        />
      }
    >
      <View style={{ rowGap: 20, paddingBottom: 16 }}>
        <SpareFields
          form={f.form}
          types={types}
          type={type}
          scan={
            <ScanButton
              onSpare={({ label }) => {
                f.form.setValue('label', label, { shouldDirty: true, shouldValidate: true });
                return null;
              }}
            />
          }
          onType={(chosen) =>
            f.form.setValue(
              'reading.groupVolts',
              resized(f.form.getValues('reading.groupVolts'), chosen.groupsInSeries),
            )
          }
        />
        <View style={{ rowGap: 10 }}>
          <Txt kind="heading" heading={2}>
            Volts at rest, read now
          </Txt>
          {type ? (
            <ReadingFields form={f.form} prefix="reading." groups={type.groupsInSeries} type={type} meters={meters} />
          ) : (
            <Txt tone="ink2">Choose the type first: it says how many groups there are.</Txt>
          )}
        </View>
      </View>
    </Screen>
  );
}
