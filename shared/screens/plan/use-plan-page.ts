import { useState } from 'react';
import { isProblem } from '@/shared/client/api-problem';
import { useNow } from '@/shared/client/clock';
import { useDraft } from '@/shared/client/drafts';
import { useMeters } from '@/shared/client/meters';
import { useModuleTypes } from '@/shared/client/module-types';
import { usePlan } from '@/shared/client/plans';
import { useSettled } from '@/shared/client/settled';
import { useSpares } from '@/shared/client/spares';
import type { PlanRequest } from '@/shared/contract/plan';
import { useFormats } from '@/shared/ui/format/formats';
import { dayOf } from '@/shared/ui/format/zone';
import { bestOption } from '@/shared/ui/plan/best-option';
import { isOfTheModule } from '@/shared/ui/plan/plan-refused';
import { emptyPlan, fieldOf, requestOf, type PlanField, type PlanTyped } from '@/shared/ui/plan/plan-typed';
import { useAddress } from './use-address';
import { useOtherSpares } from './use-other-spares';

/** Numbers are reckoned again this long after the last key. */
const settleMs = 400;

/** What the page of a plan knows: what is typed, what was reckoned from it, and which way is chosen. */
export function usePlanPage() {
  const { topUpOf, insteadOf, initial } = useAddress();
  const draft = useDraft(`plan.${topUpOf ?? insteadOf ?? initial.spareId}`, initial);
  // A draft of an earlier version may lack a field.
  const typed: PlanTyped = { ...emptyPlan, ...draft.value };
  const { zone } = useFormats();
  const now = useNow(30_000);
  const today = dayOf(now, zone);
  const spares = useSpares();
  const [left, setLeft] = useState<Partial<Record<PlanField, true>>>({});
  const [tried, setTried] = useState(false);
  const [picked, setPicked] = useState<string | null>(null);
  const spare = spares.data?.find((other) => other.id === typed.spareId) ?? null;
  const meters = useMeters().data;
  const offsetMillivolts = meters?.find((meter) => meter.id === typed.meterId)?.offsetMillivolts ?? 0;
  const types = useModuleTypes().data;
  const chemistry = types?.find((type) => type.id === spare?.moduleTypeId)?.chemistry ?? null;
  const limits = spare === null ? null : { type: spare, chemistry, offsetMillivolts };
  const { request, errors } = requestOf(typed, { zone, today, now, limits });
  // What came whole with the address or the draft is told in a few lines; anything else is still to be typed.
  const [open, setOpen] = useState(request === null);
  const settled = useSettled<PlanRequest | null>(request, settleMs);
  const plan = usePlan(settled);

  const dto = settled && plan.data && !plan.isError ? plan.data : null;
  const refused = dto !== null && dto.plan.refusals.length > 0;
  const chosen =
    dto === null || refused ? null : (dto.plan.options.find((option) => option.id === picked) ?? bestOption(dto.plan));
  const others = useOtherSpares(spare, refused && dto.plan.refusals.some(isOfTheModule) ? settled : null, spares.data);

  const shown = Object.fromEntries(
    Object.entries(errors).filter(([name]) => tried || left[name as PlanField]),
  ) as Partial<Record<PlanField, string>>;
  const serverFields = isProblem(plan.error)
    ? Object.fromEntries(Object.entries(plan.error.fields).map(([path, text]) => [fieldOf(path), text]))
    : {};

  return {
    topUpOf,
    /** The charge this plan is made in place of, while it is of the same spare. */
    insteadOf: typed.spareId === initial.spareId ? insteadOf : null,
    typed,
    now,
    today,
    spares: spares.data,
    spare,
    /** Of the chosen spare; null while it is not known. */
    chemistry,
    /** The plan's request as it is typed; null while something is missing or wrong. */
    request,
    /** The request that is reckoned, a moment after the last key. */
    settled,
    plan,
    dto,
    /** The spare is ruled out: there is no way to choose. */
    refused,
    chosen,
    /** Spares that could be taken in place of a refused one. */
    others,
    /** The sentences to show, of fields that were left or all after sending was tried. */
    errors: { ...shown, ...serverFields },
    /** How many fields need a change, after sending was tried. */
    wrong: tried ? Object.keys(errors).length : 0,
    open,
    setOpen,
    restored: draft.restored,
    change: (next: Partial<PlanTyped>) =>
      draft.set((last) => ({ ...last, ...(tellsTarget(next) ? { acceptWideBand: '' } : {}), ...next })),
    choose: setPicked,
    leave: (field: PlanField) => setLeft((last) => ({ ...last, [field]: true })),
    /** Sending was tried: every sentence is shown. */
    tryAll: () => setTried(true),
    /** Forgets what was typed; what the address brought stays. */
    clearDraft: draft.clear,
  };
}

/** The band that somebody took was that of another target. */
const tellsTarget = (next: Partial<PlanTyped>): boolean =>
  next.spareId !== undefined ||
  next.targetVolts !== undefined ||
  next.targetBy !== undefined ||
  next.meterId !== undefined;

export type PlanPage = ReturnType<typeof usePlanPage>;
