import { useDraft } from '@/shared/client/drafts';
import { useHandOverRepair } from '@/shared/client/repairs';
import type { RepairDto } from '@/shared/contract/repair';
import { repairStepNames } from '@/shared/contract/repair-steps';
import { ConfirmSheet } from '@/shared/ui/primitives/confirm-sheet';
import { Field } from '@/shared/ui/primitives/field';
import { SheetFields } from '@/shared/ui/primitives/sheet-fields';
import { Txt } from '@/shared/ui/primitives/txt';
import { problemOfAct } from './act-problem';

const noNote = '';

/** Hands a repair over; what is not done yet needs a note that says why. */
export function HandOverSheet({ repair, onClose }: { repair: RepairDto; onClose: () => void }) {
  const handOver = useHandOverRepair();
  const draft = useDraft(`repair.hand-over.${repair.id}`, noNote);
  const missing = repair.steps
    .filter(({ state }) => state !== 'done')
    .map(({ step }) => repairStepNames[step].toLowerCase());
  const note = draft.value.trim();
  const problem = problemOfAct(handOver.error);
  return (
    <ConfirmSheet
      open
      title={`Hand ${repair.number} over`}
      fact={
        missing.length === 0
          ? 'All seven steps are done. The repair is closed with your name and the time.'
          : `Not done yet: ${missing.join(', ')}. Say in the note why it is handed over without.`
      }
      confirm="It is handed over"
      safe="Not yet"
      ready={missing.length === 0 || note !== ''}
      why="Write the note first."
      busy={handOver.isPending}
      onConfirm={() =>
        handOver.mutate(
          { id: repair.id, note: note === '' ? null : note },
          {
            onSuccess: () => {
              draft.clear();
              onClose();
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
          lines={3}
          maxLength={500}
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
