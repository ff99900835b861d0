import { useRouter, type Href } from 'expo-router';
import { useState } from 'react';
import { isProblem } from '@/shared/client/api-problem';
import { useContractForm, wrongSentence } from '@/shared/client/forms';
import { useGate } from '@/shared/client/gate';
import { partState } from '@/shared/client/part-state';
import { useChangeWorkshop, useWorkshop } from '@/shared/client/workshop';
import { changeWorkshopSchema, type WorkshopDto } from '@/shared/contract/workshop';
import { useFormats } from '@/shared/ui/format/formats';
import { useToast } from '@/shared/ui/primitives/toast';
import { Txt } from '@/shared/ui/primitives/txt';
import { BoundCheck, BoundField } from '@/shared/ui/forms/bound';
import { ChangedMeanwhile, differences } from '@/shared/ui/workshop/changed-meanwhile';
import { FormFoot } from '@/shared/ui/workshop/form-foot';
import { FormScreen, Restored } from '@/shared/ui/workshop/form-screen';
import { whoMay } from '@/shared/ui/workshop/may-change';
import { limitFields, limitNames, limitTexts, technicianDecidesName } from '@/shared/ui/workshop/settings-form';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

const list = '/workshop?section=limits' as Href;

/** The limits every new charge is planned with. */
export default function Limits() {
  const router = useRouter();
  const workshop = useWorkshop();
  const onBack = () => (router.canGoBack() ? router.back() : router.replace(list));
  if (!workshop.data)
    return (
      <FormScreen
        title="Limits"
        onBack={onBack}
        what="the limits"
        state={partState(workshop)}
        onRetry={() => void workshop.refetch()}
      >
        {null}
      </FormScreen>
    );
  return <LimitsForm workshop={workshop.data} onBack={onBack} />;
}

function LimitsForm({ workshop, onBack }: { workshop: WorkshopDto; onBack: () => void }) {
  const toast = useToast();
  const { marks } = useFormats();
  const gate = useGate('workshop:write');
  const change = useChangeWorkshop();
  const [initial] = useState(() => limitTexts(workshop, marks));
  const f = useContractForm({
    schema: changeWorkshopSchema,
    initial,
    draft: 'workshop.limits',
    send: async (output) => {
      await change.mutateAsync({ ...output, rev: f.form.getValues('baseRev') });
      toast({ text: 'The limits are saved.' });
      onBack();
    },
  });
  const present = isProblem(f.error) && f.error.status === 412 ? (f.error.present as WorkshopDto) : null;
  const theirs = present ? limitTexts(present, marks) : null;
  return (
    <FormScreen
      title="Limits"
      sub={workshop.name}
      onBack={onBack}
      what="the limits"
      state="ready"
      onRetry={() => {}}
      foot={
        gate.may ? (
          <FormFoot
            title="Save the limits"
            busy={f.busy}
            wrong={f.wrong > 0 ? wrongSentence(f.wrong) : null}
            problem={theirs ? null : f.problem}
            note="Charges that are planned or running keep the limits they were planned with."
            onPress={() => void f.submit()}
          />
        ) : undefined
      }
    >
      {gate.may ? null : <Txt tone="ink2">{whoMay(gate)}</Txt>}
      <Restored restored={f.restored} onAfresh={() => f.clear(limitTexts(workshop, marks))} />
      {theirs ? (
        <ChangedMeanwhile
          what="The workshop"
          differing={differences(limitNames, { ...theirs }, { ...f.form.getValues() })}
          busy={f.busy}
          onTakeTheirs={() => f.clear(theirs)}
          onKeepMine={() => {
            f.form.setValue('baseRev', theirs.baseRev);
            void f.submit();
          }}
        />
      ) : null}
      {limitFields.map(({ key, name, unit, whole, meaning }) => (
        <BoundField
          key={key}
          form={f.form}
          name={key}
          label={name}
          kind={whole ? 'whole' : 'decimal'}
          unit={unit}
          hint={meaning}
          readOnly={!gate.may}
          nextKey="next"
        />
      ))}
      <BoundCheck
        form={f.form}
        name="technicianDecides"
        title={technicianDecidesName}
        meaning="Where the pack and the hand meter point to different modules. Not ticked: a foreman or a manager decides."
        readOnly={!gate.may}
      />
    </FormScreen>
  );
}
