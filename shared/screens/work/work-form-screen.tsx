import { useMemo, useState } from 'react';
import { isProblem } from '@/shared/client/api-problem';
import { useNow } from '@/shared/client/clock';
import { useContractForm, wrongSentence } from '@/shared/client/forms';
import { useGate } from '@/shared/client/gate';
import { useLink } from '@/shared/client/link';
import { partState } from '@/shared/client/part-state';
import { useRepairs } from '@/shared/client/repairs';
import { useStaffing } from '@/shared/client/staffing';
import { useAddWork, useChangeWork } from '@/shared/client/work';
import type { RepairDto } from '@/shared/contract/repair';
import type { WorkDto } from '@/shared/contract/work';
import { useFormats } from '@/shared/ui/format/formats';
import { dayOf } from '@/shared/ui/format/zone';
import { Forbidden } from '@/shared/ui/states/forbidden';
import { WorkFields, type WorkChoices } from '@/shared/ui/work/work-fields';
import { emptyWork, flatWork, workForm, workNames, workTexts, type WorkTyped } from '@/shared/ui/work/work-form';
import { ChangedMeanwhile, differences } from '@/shared/ui/workshop/changed-meanwhile';
import { FormFoot } from '@/shared/ui/workshop/form-foot';
import { FormScreen, Restored } from '@/shared/ui/workshop/form-screen';

/** A repair as the form needs it: to be chosen, and where it stands. */
export type WorkRepair = Pick<RepairDto, 'id' | 'number' | 'vehicle' | 'bay'>;

interface Ways {
  onBack: () => void;
  onDone: (work: WorkDto) => void;
}

/** Adds a piece of other work, or changes one; waits for what its choices are made of. */
export function WorkFormScreen({
  work,
  repair,
  ...ways
}: Ways & {
  /** Null: a new one. */
  work: WorkDto | null;
  /** The repair a new one is for; null: none. */
  repair: WorkRepair | null;
}) {
  const gate = useGate('work:write');
  const staffing = useStaffing();
  const repairs = useRepairs();
  const state = partState(staffing, repairs);
  const title = work ? 'Change other work' : 'Add other work';
  if (!gate.may || state !== 'ready')
    return (
      <FormScreen
        title={title}
        onBack={ways.onBack}
        what="the form"
        state={gate.may ? state : 'ready'}
        onRetry={() => [staffing, repairs].forEach((query) => void query.refetch())}
      >
        <Forbidden what="Other work is written" roles={gate.roles} people={gate.people} />
      </FormScreen>
    );
  const open = (repairs.data?.pages ?? []).flatMap((page) => page.repairs);
  const listed = open.map(({ id, number, vehicle }) => ({ id, label: `${number}, ${vehicle}` }));
  // The one it is for may be on a later page of the list, or over.
  const own = repair ? { id: repair.id, label: `${repair.number}, ${repair.vehicle}` } : null;
  const of = work?.repair ? { id: work.repair.id, label: work.repair.number } : own;
  return (
    <Form
      {...ways}
      title={title}
      work={work}
      repair={repair}
      choices={{
        skills: staffing.data?.skills ?? [],
        places: staffing.data?.places ?? [],
        repairs: of && !listed.some(({ id }) => id === of.id) ? [of, ...listed] : listed,
      }}
    />
  );
}

const folded: readonly (keyof WorkTyped)[] = ['longMinutes', 'dueAt', 'note', 'skillId', 'placeId', 'repairId'];

function Form({
  title,
  work,
  repair,
  choices,
  onBack,
  onDone,
}: Ways & { title: string; work: WorkDto | null; repair: WorkRepair | null; choices: WorkChoices }) {
  const { zone } = useFormats();
  const today = dayOf(useNow(60_000), zone);
  const offline = useLink().state === 'down';
  const add = useAddWork();
  const change = useChangeWork();
  const fresh = () => (work ? workTexts(work, zone, today) : newFor(repair, choices, today));
  const [initial] = useState(fresh);
  const [unfolded, setUnfolded] = useState(work !== null);
  const schema = useMemo(() => workForm(zone), [zone]);
  const f = useContractForm({
    schema,
    initial,
    draft: `work.${work?.id ?? `new.${repair?.id ?? ''}`}`,
    send: async (output) => {
      const saved = work
        ? await change.mutateAsync({ ...output, id: work.id, rev: f.form.getValues('baseRev') })
        : await add.mutateAsync(output);
      onDone(saved);
    },
  });
  const { errors } = f.form.formState;
  // A field that needs a change, or that was typed before, is never folded away.
  const open = unfolded || f.restored || folded.some((name) => errors[name] !== undefined);
  const present = isProblem(f.error) && f.error.status === 412 ? (f.error.present as WorkDto) : null;
  const theirs = present ? workTexts(present, zone, today) : null;
  const named = {
    skill: (id: string) => choices.skills.find((one) => one.id === id)?.name ?? 'a skill that is gone',
    place: (id: string) => choices.places.find((one) => one.id === id)?.name ?? 'a place that is gone',
    repair: (id: string) => choices.repairs.find((one) => one.id === id)?.label ?? 'another repair',
  };
  return (
    <FormScreen
      title={title}
      sub={work ? `${work.number}, ${work.title}` : repair ? `for ${repair.number}, ${repair.vehicle}` : undefined}
      onBack={onBack}
      what="the work"
      state="ready"
      onRetry={() => {}}
      foot={
        <FormFoot
          title={work ? 'Save the changes' : 'Put it on the list'}
          busy={f.busy}
          disabled={offline}
          note={
            offline
              ? 'No connection: what you typed is kept and waits until it is back.'
              : work
                ? undefined
                : 'It is offered to those who can do it, where it fits a wait.'
          }
          wrong={f.wrong > 0 ? wrongSentence(f.wrong) : null}
          problem={theirs ? null : f.problem}
          onPress={() => void f.submit()}
        />
      }
    >
      <Restored restored={f.restored} onAfresh={() => f.clear(fresh())} />
      {theirs ? (
        <ChangedMeanwhile
          what="This work"
          differing={differences(workNames, flatWork(theirs, named), flatWork(f.form.getValues(), named))}
          busy={f.busy}
          onTakeTheirs={() => f.clear(theirs)}
          onKeepMine={() => {
            f.form.setValue('baseRev', theirs.baseRev);
            void f.submit();
          }}
        />
      ) : null}
      <WorkFields
        form={f.form}
        choices={choices}
        named={named}
        today={today}
        unfolded={open}
        onUnfold={() => setUnfolded(true)}
      />
    </FormScreen>
  );
}

/** Work at a vehicle is done where the vehicle stands, where that is a place of the workshop. */
function newFor(repair: WorkRepair | null, { places }: WorkChoices, today: string): WorkTyped {
  const bay = repair?.bay?.trim().toLowerCase();
  const place = places.find(({ name }) => name.trim().toLowerCase() === bay);
  return emptyWork(today, { repairId: repair?.id, placeId: place?.id });
}
