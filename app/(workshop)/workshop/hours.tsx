import { useRouter, type Href } from 'expo-router';
import { useState } from 'react';
import { useController } from 'react-hook-form';
import { isProblem } from '@/shared/client/api-problem';
import { useNow } from '@/shared/client/clock';
import { useContractForm, wrongSentence } from '@/shared/client/forms';
import { useGate } from '@/shared/client/gate';
import { partState } from '@/shared/client/part-state';
import { useChangeWorkshop, useWorkshop } from '@/shared/client/workshop';
import { changeWorkshopSchema, type WorkshopDto } from '@/shared/contract/workshop';
import { knownZones } from '@/shared/ui/auth/zones';
import { clock } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { useToast } from '@/shared/ui/primitives/toast';
import { Forbidden } from '@/shared/ui/states/forbidden';
import { BoundCheck, BoundField, BoundSelect } from '@/shared/ui/forms/bound';
import { ChangedMeanwhile, differences } from '@/shared/ui/workshop/changed-meanwhile';
import { FormPart } from '@/shared/ui/workshop/field-grid';
import { FormFoot } from '@/shared/ui/workshop/form-foot';
import { FormScreen, Restored } from '@/shared/ui/workshop/form-screen';
import { HoursFields } from '@/shared/ui/workshop/hours-fields';
import { hourNames, hourTexts, hourWords, unattendedName } from '@/shared/ui/workshop/settings-form';

export { ErrorBoundary } from '@/shared/ui/shell/error-boundary';

const list = '/workshop?section=hours' as Href;

/** Name, zone and working hours. */
export default function Hours() {
  const router = useRouter();
  const gate = useGate('workshop:write');
  const workshop = useWorkshop();
  const onBack = () => (router.canGoBack() ? router.back() : router.replace(list));
  if (!gate.may || !workshop.data)
    return (
      <FormScreen
        title="Name and hours"
        onBack={onBack}
        what="the workshop"
        state={gate.may ? partState(workshop) : 'ready'}
        onRetry={() => void workshop.refetch()}
      >
        <Forbidden what="Name and hours are changed" roles={gate.roles} people={gate.people} />
      </FormScreen>
    );
  return <HoursForm workshop={workshop.data} onBack={onBack} />;
}

function HoursForm({ workshop, onBack }: { workshop: WorkshopDto; onBack: () => void }) {
  const toast = useToast();
  const { marks } = useFormats();
  const now = useNow(60_000);
  const change = useChangeWorkshop();
  const [initial] = useState(() => hourTexts(workshop));
  const [zones] = useState(() =>
    knownZones(workshop.zone).map((zone) => ({ value: zone, label: zone.replaceAll('_', ' ') })),
  );
  const f = useContractForm({
    schema: changeWorkshopSchema,
    initial,
    draft: 'workshop.hours',
    send: async (output) => {
      await change.mutateAsync({ ...output, rev: f.form.getValues('baseRev') });
      toast({ text: 'Name and hours are saved.' });
      onBack();
    },
  });
  const zone = useController({ control: f.form.control, name: 'zone' }).field.value;
  const present = isProblem(f.error) && f.error.status === 412 ? (f.error.present as WorkshopDto) : null;
  const theirs = present ? hourTexts(present) : null;
  return (
    <FormScreen
      title="Name and hours"
      sub={workshop.name}
      onBack={onBack}
      what="the workshop"
      state="ready"
      onRetry={() => {}}
      foot={
        <FormFoot
          title="Save name and hours"
          busy={f.busy}
          wrong={f.wrong > 0 ? wrongSentence(f.wrong) : null}
          problem={theirs ? null : f.problem}
          onPress={() => void f.submit()}
        />
      }
    >
      <Restored restored={f.restored} onAfresh={() => f.clear(hourTexts(workshop))} />
      {theirs ? (
        <ChangedMeanwhile
          what="The workshop"
          differing={differences(hourNames, hourWords(theirs), hourWords(f.form.getValues()))}
          busy={f.busy}
          onTakeTheirs={() => f.clear(theirs)}
          onKeepMine={() => {
            f.form.setValue('baseRev', theirs.baseRev);
            void f.submit();
          }}
        />
      ) : null}
      <BoundField form={f.form} name="name" label="Name" required autoComplete="organization" nextKey="next" />
      <BoundSelect
        form={f.form}
        name="zone"
        label="Its clock"
        options={zones}
        hint={`Now ${clock(now, zone || 'UTC', marks)} there. Every time in the app is shown in it.`}
      />
      <FormPart title="Working hours" note="When somebody is there to clip on and to look in.">
        <HoursFields form={f.form} name="workingHours" />
        <BoundCheck
          form={f.form}
          name="unattendedCharges"
          title={unattendedName}
          meaning="Overnight, in breaks, at weekends. Not ticked: a charge is planned only where somebody can look in."
        />
      </FormPart>
    </FormScreen>
  );
}
