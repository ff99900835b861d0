import { useMemo, useState } from 'react';
import { useNow } from '@/shared/client/clock';
import { isConflict, isProblem } from '@/shared/client/api-problem';
import { useContractForm, wrongSentence } from '@/shared/client/forms';
import { useLink } from '@/shared/client/link';
import { useModuleTypes } from '@/shared/client/module-types';
import { usePackTypes } from '@/shared/client/pack-types';
import { partState } from '@/shared/client/part-state';
import { usePeople } from '@/shared/client/people';
import { useChangeRepair, useStartRepair } from '@/shared/client/repairs';
import { useMember } from '@/shared/client/session';
import type { ModuleTypeDto } from '@/shared/contract/equipment';
import type { PackTypeDto } from '@/shared/contract/pack';
import type { PersonDto } from '@/shared/contract/people';
import type { ChangeRepairInput, RepairDto, RepairInput, RepairPageDto } from '@/shared/contract/repair';
import { useFormats } from '@/shared/ui/format/formats';
import { dayOf } from '@/shared/ui/format/zone';
import { RepairFields } from '@/shared/ui/repair/repair-fields';
import {
  changeRepairForm,
  emptyRepair,
  flatTexts,
  newRepairForm,
  repairNames,
  repairTexts,
} from '@/shared/ui/repair/repair-form';
import { ChangedMeanwhile, differences } from '@/shared/ui/workshop/changed-meanwhile';
import { FormFoot } from '@/shared/ui/workshop/form-foot';
import { FormScreen, Restored } from '@/shared/ui/workshop/form-screen';

/** Starts a repair, or changes what was booked; waits for what its choices are made of. */
export function RepairFormScreen({
  repair,
  onBack,
  onDone,
}: {
  /** Null: a new one. */
  repair: RepairDto | null;
  onBack: () => void;
  onDone: (repair: RepairPageDto) => void;
}) {
  const packTypes = usePackTypes();
  const moduleTypes = useModuleTypes();
  const people = usePeople();
  const state = partState(packTypes, moduleTypes, people);
  if (state !== 'ready')
    return (
      <FormScreen
        title={repair ? `Change ${repair.number}` : 'Start a repair'}
        onBack={onBack}
        what="the form"
        state={state}
        onRetry={() => [packTypes, moduleTypes, people].forEach((query) => void query.refetch())}
      >
        {null}
      </FormScreen>
    );
  return (
    <Form
      repair={repair}
      packTypes={packTypes.data ?? []}
      moduleTypes={moduleTypes.data ?? []}
      people={(people.data ?? []).filter(({ id, disabled }) => !disabled || repair?.personIds.includes(id))}
      onBack={onBack}
      onDone={onDone}
    />
  );
}

function Form({
  repair,
  packTypes,
  moduleTypes,
  people,
  onBack,
  onDone,
}: {
  repair: RepairDto | null;
  packTypes: readonly PackTypeDto[];
  moduleTypes: readonly ModuleTypeDto[];
  people: readonly PersonDto[];
  onBack: () => void;
  onDone: (repair: RepairPageDto) => void;
}) {
  const { zone, marks } = useFormats();
  const today = dayOf(useNow(60_000), zone);
  const me = useMember().person.id;
  const offline = useLink().state === 'down';
  const start = useStartRepair();
  const change = useChangeRepair();
  const [initial] = useState(() => (repair ? repairTexts(repair, zone, today, marks) : emptyRepair(today, me)));
  const fresh = repair === null;
  const schema = useMemo(() => (fresh ? newRepairForm(zone) : changeRepairForm(zone)), [fresh, zone]);
  const f = useContractForm({
    schema,
    initial,
    draft: `repair.${repair?.id ?? 'new'}`,
    send: async (output: RepairInput | ChangeRepairInput) => {
      const saved = repair
        ? await change.mutateAsync({ ...output, id: repair.id, rev: f.form.getValues('baseRev') })
        : await start.mutateAsync(output);
      onDone(saved);
    },
  });
  const stale = isProblem(f.error) && isConflict(f.error) && f.error.status === 412;
  const theirs = stale ? repairTexts((f.error as { present: RepairDto }).present, zone, today, marks) : null;
  const named = (id: string) => people.find((person) => person.id === id)?.name ?? 'somebody';
  return (
    <FormScreen
      title={repair ? `Change ${repair.number}` : 'Start a repair'}
      onBack={onBack}
      what="the repair"
      state="ready"
      onRetry={() => {}}
      foot={
        <FormFoot
          title={repair ? 'Save the changes' : 'Start the repair'}
          busy={f.busy}
          disabled={offline}
          note={offline ? 'No connection: what you typed is kept and waits until it is back.' : undefined}
          wrong={f.wrong > 0 ? wrongSentence(f.wrong) : null}
          problem={theirs ? null : f.problem}
          onPress={() => void f.submit()}
        />
      }
    >
      <Restored
        restored={f.restored}
        onAfresh={() => f.clear(repair ? repairTexts(repair, zone, today, marks) : emptyRepair(today, me))}
      />
      {theirs ? (
        <ChangedMeanwhile
          what="This repair"
          differing={differences(repairNames, flatTexts(theirs, named), flatTexts(f.form.getValues(), named))}
          busy={f.busy}
          onTakeTheirs={() => f.clear(theirs)}
          onKeepMine={() => {
            f.form.setValue('baseRev', theirs.baseRev);
            void f.submit();
          }}
        />
      ) : null}
      <RepairFields
        form={f.form}
        fresh={fresh}
        fixedCount={repair?.readings.some(({ setAside }) => setAside === null) ?? false}
        packTypes={packTypes}
        moduleTypes={moduleTypes}
        people={people}
        today={today}
      />
    </FormScreen>
  );
}
