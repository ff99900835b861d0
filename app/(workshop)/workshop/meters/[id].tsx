import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { useState } from 'react';
import { isProblem, sentenceOf } from '@/shared/client/api-problem';
import { useNow } from '@/shared/client/clock';
import { useContractForm, wrongSentence } from '@/shared/client/forms';
import { useGate } from '@/shared/client/gate';
import { useMeters, useRemoveMeter, useSaveMeter } from '@/shared/client/meters';
import { partState } from '@/shared/client/part-state';
import { meterSchema, type MeterDto } from '@/shared/contract/equipment';
import { date } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { dayOf } from '@/shared/ui/format/zone';
import { useToast } from '@/shared/ui/primitives/toast';
import { Txt } from '@/shared/ui/primitives/txt';
import { BoundDay } from '@/shared/ui/workshop/bound-day';
import { BoundField } from '@/shared/ui/forms/bound';
import { ChangedMeanwhile, differences } from '@/shared/ui/workshop/changed-meanwhile';
import { FormFoot } from '@/shared/ui/workshop/form-foot';
import { FormScreen, Restored } from '@/shared/ui/workshop/form-screen';
import { whoMay } from '@/shared/ui/workshop/may-change';
import { typedNumber } from '@/shared/ui/workshop/numbers-typed';
import { RemoveThing } from '@/shared/ui/workshop/remove-thing';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

const list = '/workshop?section=meters' as Href;
const names = { name: 'Name', offsetMillivolts: 'Reads too high by', checkedAt: 'Last cross-check' };

/** A meter, or a new one (`new`). */
export default function Meter() {
  const router = useRouter();
  const { id = 'new' } = useLocalSearchParams<{ id: string }>();
  const meters = useMeters();
  const onBack = () => (router.canGoBack() ? router.back() : router.replace(list));
  const meter = meters.data?.find((each) => each.id === id) ?? null;
  const state = partState(meters);
  const missing = state === 'ready' && id !== 'new' && !meter;
  if (state !== 'ready' || missing)
    return (
      <FormScreen
        title={id === 'new' ? 'New meter' : 'Meter'}
        onBack={onBack}
        what="the meter"
        state={missing ? { failed: 'It is not on the list any more.' } : state}
        onRetry={() => void meters.refetch()}
      >
        {null}
      </FormScreen>
    );
  return <MeterForm key={id} meter={meter} onBack={onBack} />;
}

function MeterForm({ meter, onBack }: { meter: MeterDto | null; onBack: () => void }) {
  const toast = useToast();
  const { zone, marks } = useFormats();
  const gate = useGate('equipment:write');
  const now = useNow(60_000);
  const save = useSaveMeter();
  const remove = useRemoveMeter();
  const texts = (of: MeterDto | null) => ({
    name: of?.name ?? '',
    offsetMillivolts: of ? typedNumber(of.offsetMillivolts, 0, marks) : '0',
    checkedAt: of?.checkedAt ?? '',
    baseRev: of?.rev ?? 0,
  });
  const words = (of: ReturnType<typeof texts>) => ({
    ...of,
    checkedAt: of.checkedAt ? date(Date.parse(of.checkedAt), zone, now) : 'never',
  });
  const [initial] = useState(() => texts(meter));
  const f = useContractForm({
    schema: meterSchema,
    initial,
    draft: `meter.${meter?.id ?? 'new'}`,
    send: async (output) => {
      const rev = f.form.getValues('baseRev');
      const saved = await save.mutateAsync(meter ? { ...output, id: meter.id, rev } : output);
      toast({ text: `${saved.name} is saved.` });
      onBack();
    },
  });
  const present = isProblem(f.error) && f.error.status === 412 ? (f.error.present as MeterDto) : null;
  const theirs = present ? texts(present) : null;
  return (
    <FormScreen
      title={meter?.name ?? 'New meter'}
      onBack={onBack}
      what="the meter"
      state="ready"
      onRetry={() => {}}
      foot={
        gate.may ? (
          <FormFoot
            title="Save the meter"
            busy={f.busy}
            wrong={f.wrong > 0 ? wrongSentence(f.wrong) : null}
            problem={theirs ? null : f.problem}
            onPress={() => void f.submit()}
          />
        ) : undefined
      }
    >
      {gate.may ? null : <Txt tone="ink2">{whoMay(gate)}</Txt>}
      <Restored restored={f.restored} onAfresh={() => f.clear(texts(meter))} />
      {theirs ? (
        <ChangedMeanwhile
          what="This meter"
          differing={differences(names, words(theirs), words(f.form.getValues()))}
          busy={f.busy}
          onTakeTheirs={() => f.clear(theirs)}
          onKeepMine={() => {
            f.form.setValue('baseRev', theirs.baseRev);
            void f.submit();
          }}
        />
      ) : null}
      <BoundField
        form={f.form}
        name="name"
        label={names.name}
        required
        hint="As written on it: every reading names its meter."
        readOnly={!gate.may}
        nextKey="next"
      />
      <BoundField
        form={f.form}
        name="offsetMillivolts"
        label={names.offsetMillivolts}
        kind="decimal"
        unit="mV"
        hint="Against the reference. Below zero where it reads too low. Taken off every reading with it."
        readOnly={!gate.may}
      />
      <BoundDay
        form={f.form}
        name="checkedAt"
        label={names.checkedAt}
        hint="Empty: never. Older than 90 days, its bands are wider."
        today={dayOf(now, zone)}
        readOnly={!gate.may}
      />
      {gate.may && meter ? (
        <RemoveThing
          name={meter.name}
          thing="meter"
          fact="Only a meter that no reading and no charger names can be removed."
          busy={remove.isPending}
          problem={remove.error ? sentenceOf(remove.error) : null}
          onRemove={(done) =>
            remove.mutate(
              { id: meter.id, rev: meter.rev },
              {
                onSuccess: () => {
                  toast({ text: `${meter.name} is removed.` });
                  onBack();
                },
                onSettled: done,
              },
            )
          }
        />
      ) : null}
    </FormScreen>
  );
}
