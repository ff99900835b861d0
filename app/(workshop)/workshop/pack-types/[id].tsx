import { useLocalSearchParams, useRouter, type Href } from 'expo-router';
import { useState } from 'react';
import { isProblem } from '@/shared/client/api-problem';
import { useContractForm, wrongSentence } from '@/shared/client/forms';
import { useGate } from '@/shared/client/gate';
import { useModuleTypes } from '@/shared/client/module-types';
import { usePackTypes, useSavePackType } from '@/shared/client/pack-types';
import { partState } from '@/shared/client/part-state';
import type { ModuleTypeDto } from '@/shared/contract/equipment';
import type { PackTypeDto } from '@/shared/contract/pack';
import { useFormats } from '@/shared/ui/format/formats';
import { BoundField } from '@/shared/ui/forms/bound';
import { useToast } from '@/shared/ui/primitives/toast';
import { Txt } from '@/shared/ui/primitives/txt';
import { PackFields } from '@/shared/ui/repair/pack-fields';
import { flatPackType, packTypeForm, packTypeNames, packTypeTexts } from '@/shared/ui/repair/pack-type-form';
import { ChangedMeanwhile, differences } from '@/shared/ui/workshop/changed-meanwhile';
import { FormFoot } from '@/shared/ui/workshop/form-foot';
import { FormScreen, Restored } from '@/shared/ui/workshop/form-screen';
import { whoMay } from '@/shared/ui/workshop/may-change';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

const list = '/workshop?section=pack-types' as Href;

/** A template of a pack, or a new one (`new`). */
export default function PackType() {
  const router = useRouter();
  const { id = 'new' } = useLocalSearchParams<{ id: string }>();
  const packTypes = usePackTypes();
  const moduleTypes = useModuleTypes();
  const onBack = () => (router.canGoBack() ? router.back() : router.replace(list));
  const packType = packTypes.data?.find((each) => each.id === id) ?? null;
  const state = partState(packTypes, moduleTypes);
  const missing = state === 'ready' && id !== 'new' && !packType;
  if (state !== 'ready' || missing)
    return (
      <FormScreen
        title={id === 'new' ? 'New pack type' : 'Pack type'}
        onBack={onBack}
        what="the pack type"
        state={missing ? { failed: 'It is not on the list any more.' } : state}
        onRetry={() => [packTypes, moduleTypes].forEach((query) => void query.refetch())}
      >
        {null}
      </FormScreen>
    );
  return <Form key={id} packType={packType} moduleTypes={moduleTypes.data ?? []} onBack={onBack} />;
}

function Form({
  packType,
  moduleTypes,
  onBack,
}: {
  packType: PackTypeDto | null;
  moduleTypes: readonly ModuleTypeDto[];
  onBack: () => void;
}) {
  const toast = useToast();
  const { marks } = useFormats();
  const gate = useGate('equipment:write');
  const save = useSavePackType();
  const [initial] = useState(() => packTypeTexts(packType, marks));
  const f = useContractForm({
    schema: packTypeForm,
    initial,
    draft: `pack-type.${packType?.id ?? 'new'}`,
    send: async (output) => {
      const rev = f.form.getValues('baseRev');
      const saved = await save.mutateAsync(packType ? { ...output, id: packType.id, rev } : output);
      toast({ text: `${saved.name} is saved.` });
      onBack();
    },
  });
  const present = isProblem(f.error) && f.error.status === 412 ? (f.error.present as PackTypeDto) : null;
  const theirs = present ? packTypeTexts(present, marks) : null;
  return (
    <FormScreen
      title={packType?.name ?? 'New pack type'}
      onBack={onBack}
      what="the pack type"
      state="ready"
      onRetry={() => {}}
      foot={
        gate.may ? (
          <FormFoot
            title="Save the pack type"
            busy={f.busy}
            wrong={f.wrong > 0 ? wrongSentence(f.wrong) : null}
            problem={theirs ? null : f.problem}
            onPress={() => void f.submit()}
          />
        ) : undefined
      }
    >
      {gate.may ? null : <Txt tone="ink2">{whoMay(gate)}</Txt>}
      <Restored restored={f.restored} onAfresh={() => f.clear(packTypeTexts(packType, marks))} />
      {theirs ? (
        <ChangedMeanwhile
          what="This pack type"
          differing={differences(packTypeNames, flatPackType(theirs), flatPackType(f.form.getValues()))}
          busy={f.busy}
          onTakeTheirs={() => f.clear(theirs)}
          onKeepMine={() => {
            f.form.setValue('baseRev', theirs.baseRev);
            void f.submit();
          }}
        />
      ) : null}
      <BoundField form={f.form} name="name" label={packTypeNames.name} required readOnly={!gate.may} nextKey="next" />
      <PackFields form={f.form} types={moduleTypes} readOnly={!gate.may} />
      <BoundField
        form={f.form}
        name="usualArrivalVolts"
        label={packTypeNames.usualArrivalVolts}
        kind="decimal"
        unit="V"
        hint="rest voltage of a group; a spare is brought close to it before the pack is read. Left empty: as your own arrivals tell"
        readOnly={!gate.may}
        nextKey="next"
      />
      <BoundField form={f.form} name="note" label={packTypeNames.note} multiline lines={2} readOnly={!gate.may} />
      {packType ? (
        <Txt kind="small" tone="ink2">
          Repairs that are booked keep the numbers they were booked with.
        </Txt>
      ) : null}
    </FormScreen>
  );
}
