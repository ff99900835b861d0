import { useDraft } from '@/shared/client/drafts';
import { useNow } from '@/shared/client/clock';
import { useFitAsItIs } from '@/shared/client/repairs';
import type { RepairPageDto } from '@/shared/contract/repair';
import { moment } from '@/shared/ui/format/clock';
import { useFormats } from '@/shared/ui/format/formats';
import { tolerance, volts } from '@/shared/ui/format/quantities';
import { ConfirmSheet } from '@/shared/ui/primitives/confirm-sheet';
import { Field } from '@/shared/ui/primitives/field';
import { SheetFields } from '@/shared/ui/primitives/sheet-fields';
import { Txt } from '@/shared/ui/primitives/txt';
import { problemOfAct } from './act-problem';

const noNote = '';

/** Keeps that the reserved spare went in without a charge; null where there is none that could. */
export function FitSheet({
  repair,
  onClose,
  onFitted,
}: {
  repair: RepairPageDto;
  onClose: () => void;
  onFitted?: () => void;
}) {
  const { zone, marks } = useFormats();
  const now = useNow(60_000);
  const fit = useFitAsItIs();
  const draft = useDraft(`repair.fit.${repair.id}`, noNote);
  const { spare, target, asItIs, failing } = repair;
  const problem = problemOfAct(fit.error);
  if (!spare || !target || !asItIs) return null;
  const held = `${tolerance(target.toleranceMillivolts / 1000)} of ${volts(target.volts, marks)}`;
  const place = failing === null ? '' : ` as module ${failing}`;
  return (
    <ConfirmSheet
      open
      title={`Fit ${spare.label} without a charge`}
      fact={`It rests within ${held}, read ${moment(Date.parse(asItIs.readAt), zone, now, marks)}. It goes in${place}, with your name and the time.`}
      confirm="It is fitted"
      safe="Not yet"
      busy={fit.isPending}
      onConfirm={() =>
        fit.mutate(
          { id: repair.id, rev: repair.rev, note: draft.value.trim() === '' ? null : draft.value.trim() },
          {
            onSuccess: () => {
              draft.clear();
              onClose();
              onFitted?.();
            },
          },
        )
      }
      onClose={onClose}
    >
      <SheetFields under>
        <Field
          label="Note"
          value={draft.value}
          onChangeText={(text) => draft.set(text)}
          multiline
          lines={2}
          maxLength={300}
        />
        {problem ? (
          <Txt tone="alarm" bold role="alert">
            {problem}
          </Txt>
        ) : null}
      </SheetFields>
    </ConfirmSheet>
  );
}
