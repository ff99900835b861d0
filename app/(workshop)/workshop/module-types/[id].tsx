import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { useState } from 'react';
import { View } from 'react-native';
import { isProblem, sentenceOf } from '@/shared/client/api-problem';
import { useContractForm, wrongSentence } from '@/shared/client/forms';
import { useGate } from '@/shared/client/gate';
import { useModuleType, useRemoveModuleType, useSaveModuleType } from '@/shared/client/module-types';
import { partState } from '@/shared/client/part-state';
import { moduleTypeSchema, type ModuleTypeDto } from '@/shared/contract/equipment';
import { OwnCurve } from '@/shared/screens/workshop/own-curve';
import { ProblemLine } from '@/shared/ui/auth/problem-line';
import { useFormats } from '@/shared/ui/format/formats';
import { Button } from '@/shared/ui/primitives/button';
import { useToast } from '@/shared/ui/primitives/toast';
import { Txt } from '@/shared/ui/primitives/txt';
import { useBreakpoint } from '@/shared/ui/theme/use-breakpoint';
import { ChangedMeanwhile, differences } from '@/shared/ui/workshop/changed-meanwhile';
import { FormFoot } from '@/shared/ui/workshop/form-foot';
import { FormScreen, Restored } from '@/shared/ui/workshop/form-screen';
import { whoMay } from '@/shared/ui/workshop/may-change';
import { RemoveThing } from '@/shared/ui/workshop/remove-thing';
import { TypeColumns } from '@/shared/ui/workshop/type-columns';
import { TypeCurve } from '@/shared/ui/workshop/type-curve';
import { TypeFields } from '@/shared/ui/workshop/type-fields';
import { copiedTexts, typeFieldNames, typeTexts, typeWords, type TypeTexts } from '@/shared/ui/workshop/type-form';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

const list = '/workshop?section=module-types' as Href;
const counted = (count: number, thing: string) => `${count} ${thing}${count === 1 ? '' : 's'}`;

/** One module type, a new one (`new`), or a copy of one (`new?from=…`). */
export default function ModuleType() {
  const router = useRouter();
  const { id = 'new', from = '' } = useLocalSearchParams<{ id: string; from?: string }>();
  const fresh = id === 'new';
  const own = useModuleType(fresh ? '' : id);
  const model = useModuleType(fresh ? from : '');
  const source = fresh ? model : own;
  const onBack = () => (router.canGoBack() ? router.back() : router.replace(list));
  const state = fresh && from === '' ? 'ready' : partState(source);
  if (state !== 'ready')
    return (
      <FormScreen
        title={fresh ? 'New module type' : 'Module type'}
        onBack={onBack}
        what="the module type"
        state={state}
        onRetry={() => void source.refetch()}
      >
        {null}
      </FormScreen>
    );
  return <TypeForm key={`${id} ${from}`} type={own.data ?? null} model={model.data ?? null} onBack={onBack} />;
}

function TypeForm({
  type,
  model,
  onBack,
}: {
  type: ModuleTypeDto | null;
  model: ModuleTypeDto | null;
  onBack: () => void;
}) {
  const router = useRouter();
  const toast = useToast();
  const { marks } = useFormats();
  const wide = useBreakpoint() === 'wide';
  const gate = useGate('equipment:write');
  const save = useSaveModuleType();
  const remove = useRemoveModuleType();
  const [initial] = useState<TypeTexts>(() => (model ? copiedTexts(model, marks) : typeTexts(type, marks)));
  const f = useContractForm({
    schema: moduleTypeSchema,
    initial,
    draft: `module-type.${type?.id ?? (model ? `new.${model.id}` : 'new')}`,
    send: async (output) => {
      const rev = f.form.getValues('baseRev');
      // The select knows no null: its empty value is the usual curve.
      const input = { ...output, curveId: output.curveId || null };
      const saved = await save.mutateAsync(type ? { ...input, id: type.id, rev } : input);
      toast({ text: `${saved.name} is saved.` });
      onBack();
    },
  });
  const present = isProblem(f.error) && f.error.status === 412 ? (f.error.present as ModuleTypeDto) : null;
  const theirs = present ? typeTexts(present, marks) : null;
  const wrong = f.wrong > 0 ? wrongSentence(f.wrong) : null;
  const saveButton = <Button size="small" title="Save the type" busy={f.busy} onPress={() => void f.submit()} />;
  const copyButton = type ? (
    <Button
      look="line"
      size={wide ? 'small' : 'normal'}
      title="Copy to a new type"
      onPress={() => router.push(`/workshop/module-types/new?from=${type.id}` as Href)}
    />
  ) : null;
  return (
    <FormScreen
      title={type ? type.name : model ? `Copy of ${model.name}` : 'New module type'}
      sub={
        type
          ? `module type · ${counted(type.chargeCount, 'charge')} so far · ${counted(type.spareCount, 'spare')}`
          : undefined
      }
      onBack={onBack}
      single={false}
      what="the module type"
      state="ready"
      onRetry={() => {}}
      action={
        gate.may ? (
          <View style={{ flexDirection: 'row', columnGap: 20 }}>
            {copyButton}
            {saveButton}
          </View>
        ) : undefined
      }
      foot={
        gate.may && !wide ? (
          <FormFoot
            title="Save the type"
            busy={f.busy}
            wrong={wrong}
            problem={theirs ? null : f.problem}
            onPress={() => void f.submit()}
          />
        ) : undefined
      }
    >
      {gate.may ? null : <Txt tone="ink2">{whoMay(gate)}</Txt>}
      <Restored restored={f.restored} onAfresh={() => f.clear(type ? typeTexts(type, marks) : initial)} />
      {wide && !theirs && (f.problem ?? wrong) ? <ProblemLine text={f.problem ?? wrong} /> : null}
      {theirs ? (
        <ChangedMeanwhile
          what="This module type"
          differing={differences(typeFieldNames, typeWords(theirs), typeWords(f.form.getValues()))}
          busy={f.busy}
          onTakeTheirs={() => f.clear(theirs)}
          onKeepMine={() => {
            f.form.setValue('baseRev', theirs.baseRev);
            void f.submit();
          }}
        />
      ) : null}
      <TypeColumns
        form={<TypeFields form={f.form} readOnly={!gate.may} />}
        picture={
          <TypeCurve
            form={f.form}
            own={type?.ownCurve ?? null}
            readOnly={!gate.may}
            ownActs={(input) =>
              !gate.may ? null : type ? (
                <OwnCurve
                  type={type}
                  rev={type.rev}
                  input={input}
                  onSaved={(saved) => {
                    // A form that was behind already stays so: its next save has to say whose change came between.
                    if (f.form.getValues('baseRev') === type.rev) f.form.setValue('baseRev', saved.rev);
                  }}
                />
              ) : (
                <Txt kind="small" tone="ink2">
                  A curve of your own can be added once the type is saved.
                </Txt>
              )
            }
          />
        }
      />
      {gate.may && type ? (
        <View style={{ rowGap: 12 }}>
          {wide ? null : copyButton}
          <View style={{ maxWidth: 540 }}>
            <RemoveThing
              name={type.name}
              thing="type"
              fact="It cannot be brought back. No spare and no charge is of it."
              why={
                type.spareCount + type.chargeCount > 0
                  ? `${counted(type.spareCount, 'spare')} and ${counted(type.chargeCount, 'charge')} are of this type. A type in use cannot be removed.`
                  : null
              }
              busy={remove.isPending}
              problem={remove.error ? sentenceOf(remove.error) : null}
              onRemove={(done) =>
                remove.mutate(
                  { id: type.id, rev: type.rev },
                  {
                    onSuccess: () => {
                      toast({ text: `${type.name} is removed.` });
                      router.replace(list);
                    },
                    onSettled: done,
                  },
                )
              }
            />
          </View>
        </View>
      ) : null}
    </FormScreen>
  );
}
