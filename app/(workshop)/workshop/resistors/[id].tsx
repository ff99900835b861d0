import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { useState } from 'react';
import { isProblem, sentenceOf } from '@/shared/client/api-problem';
import { useContractForm, wrongSentence } from '@/shared/client/forms';
import { useGate } from '@/shared/client/gate';
import { partState } from '@/shared/client/part-state';
import { useRemoveResistor, useResistors, useSaveResistor } from '@/shared/client/resistors';
import { resistorSchema, type ResistorDto } from '@/shared/contract/equipment';
import { useFormats } from '@/shared/ui/format/formats';
import { useToast } from '@/shared/ui/primitives/toast';
import { Txt } from '@/shared/ui/primitives/txt';
import { BoundField } from '@/shared/ui/forms/bound';
import { ChangedMeanwhile, differences } from '@/shared/ui/workshop/changed-meanwhile';
import { FieldGrid } from '@/shared/ui/workshop/field-grid';
import { FormFoot } from '@/shared/ui/workshop/form-foot';
import { FormScreen, Restored } from '@/shared/ui/workshop/form-screen';
import { whoMay } from '@/shared/ui/workshop/may-change';
import { typedNumber } from '@/shared/ui/workshop/numbers-typed';
import { RemoveThing } from '@/shared/ui/workshop/remove-thing';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

const list = '/workshop?section=resistors' as Href;
const names = { name: 'Name', ohm: 'Resistance', maxWatts: 'Stands' };

/** A levelling resistor, or a new one (`new`). */
export default function Resistor() {
  const router = useRouter();
  const { id = 'new' } = useLocalSearchParams<{ id: string }>();
  const resistors = useResistors();
  const onBack = () => (router.canGoBack() ? router.back() : router.replace(list));
  const resistor = resistors.data?.find((each) => each.id === id) ?? null;
  const state = partState(resistors);
  const missing = state === 'ready' && id !== 'new' && !resistor;
  if (state !== 'ready' || missing)
    return (
      <FormScreen
        title={id === 'new' ? 'New levelling resistor' : 'Levelling resistor'}
        onBack={onBack}
        what="the resistor"
        state={missing ? { failed: 'It is not on the list any more.' } : state}
        onRetry={() => void resistors.refetch()}
      >
        {null}
      </FormScreen>
    );
  return <ResistorForm key={id} resistor={resistor} onBack={onBack} />;
}

function ResistorForm({ resistor, onBack }: { resistor: ResistorDto | null; onBack: () => void }) {
  const toast = useToast();
  const { marks } = useFormats();
  const gate = useGate('equipment:write');
  const save = useSaveResistor();
  const remove = useRemoveResistor();
  const texts = (of: ResistorDto | null) => ({
    name: of?.name ?? '',
    ohm: typedNumber(of?.ohm, 0, marks),
    maxWatts: typedNumber(of?.maxWatts, 0, marks),
    baseRev: of?.rev ?? 0,
  });
  const [initial] = useState(() => texts(resistor));
  const f = useContractForm({
    schema: resistorSchema,
    initial,
    draft: `resistor.${resistor?.id ?? 'new'}`,
    send: async (output) => {
      const rev = f.form.getValues('baseRev');
      const saved = await save.mutateAsync(resistor ? { ...output, id: resistor.id, rev } : output);
      toast({ text: `${saved.name} is saved.` });
      onBack();
    },
  });
  const present = isProblem(f.error) && f.error.status === 412 ? (f.error.present as ResistorDto) : null;
  const theirs = present ? texts(present) : null;
  return (
    <FormScreen
      title={resistor?.name ?? 'New levelling resistor'}
      onBack={onBack}
      what="the resistor"
      state="ready"
      onRetry={() => {}}
      foot={
        gate.may ? (
          <FormFoot
            title="Save the resistor"
            busy={f.busy}
            wrong={f.wrong > 0 ? wrongSentence(f.wrong) : null}
            problem={theirs ? null : f.problem}
            onPress={() => void f.submit()}
          />
        ) : undefined
      }
    >
      {gate.may ? null : <Txt tone="ink2">{whoMay(gate)}</Txt>}
      <Restored restored={f.restored} onAfresh={() => f.clear(texts(resistor))} />
      {theirs ? (
        <ChangedMeanwhile
          what="This resistor"
          differing={differences(names, theirs, f.form.getValues())}
          busy={f.busy}
          onTakeTheirs={() => f.clear(theirs)}
          onKeepMine={() => {
            f.form.setValue('baseRev', theirs.baseRev);
            void f.submit();
          }}
        />
      ) : null}
      <BoundField form={f.form} name="name" label={names.name} required readOnly={!gate.may} nextKey="next" />
      <FieldGrid two>
        <BoundField
          form={f.form}
          name="ohm"
          label={names.ohm}
          kind="decimal"
          unit="Ω"
          hint="as measured, with its leads"
          readOnly={!gate.may}
          nextKey="next"
        />
        <BoundField
          form={f.form}
          name="maxWatts"
          label={names.maxWatts}
          kind="decimal"
          unit="W"
          hint="what it bears for hours"
          readOnly={!gate.may}
        />
      </FieldGrid>
      {gate.may && resistor ? (
        <RemoveThing
          name={resistor.name}
          thing="resistor"
          fact="Plans no longer offer it. It cannot be brought back."
          busy={remove.isPending}
          problem={remove.error ? sentenceOf(remove.error) : null}
          onRemove={(done) =>
            remove.mutate(
              { id: resistor.id, rev: resistor.rev },
              {
                onSuccess: () => {
                  toast({ text: `${resistor.name} is removed.` });
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
