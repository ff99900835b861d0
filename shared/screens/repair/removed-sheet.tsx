import { useDraft } from '@/shared/client/drafts';
import { useRecordRemoved } from '@/shared/client/repairs';
import { groupsAt } from '@/shared/contract/pack';
import { moduleFateNames, moduleFates, type ModuleFate, type RepairDto } from '@/shared/contract/repair';
import { ChoiceList } from '@/shared/ui/primitives/choice-row';
import { ConfirmSheet } from '@/shared/ui/primitives/confirm-sheet';
import { Field } from '@/shared/ui/primitives/field';
import { SheetFields } from '@/shared/ui/primitives/sheet-fields';
import { Txt } from '@/shared/ui/primitives/txt';
import { problemOfAct } from './act-problem';

interface RemovedDraft {
  /** Null: the failing one. */
  position: string | null;
  fate: ModuleFate | null;
  note: string;
}
const noDraft: RemovedDraft = { position: null, fate: null, note: '' };

const meanings: Record<ModuleFate, string> = {
  scrap: 'It leaves the workshop as waste.',
  quarantine: 'It is kept apart, and nobody fits it.',
  stock: 'It was tested and stands on the shelf as a spare.',
  'went-back-in': 'Advised against, and declined.',
};

/** What became of the module that was taken out. Nothing is preselected. */
export function RemovedSheet({ repair, onClose }: { repair: RepairDto; onClose: () => void }) {
  const record = useRecordRemoved();
  const draft = useDraft(`repair.removed.${repair.id}`, noDraft);
  const { fate, note } = draft.value;
  const position = draft.value.position ?? repair.failing ?? '';
  const known = position.trim() !== '' && groupsAt(repair.pack, position.trim()).length > 0;
  const needsNote = fate === 'went-back-in' && note.trim() === '';
  const problem = problemOfAct(record.error);
  const change = (next: Partial<RemovedDraft>) => draft.set((last) => ({ ...last, ...next }));
  return (
    <ConfirmSheet
      open
      title="The module taken out"
      confirm="Record it"
      safe="Not yet"
      ready={known && fate !== null && !needsNote}
      why={
        !known
          ? 'Type a module of this pack first.'
          : fate === null
            ? 'Choose what became of it first.'
            : 'Say what was advised and why it was declined.'
      }
      busy={record.isPending}
      onConfirm={() =>
        fate &&
        record.mutate(
          { id: repair.id, modulePosition: position.trim(), fate, note: note.trim() === '' ? null : note.trim() },
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
      <SheetFields>
        <Field
          label="Module position"
          kind="label"
          value={position}
          maxLength={20}
          onChangeText={(text) => change({ position: text })}
          error={position.trim() !== '' && !known ? `This pack has no module ${position.trim()}.` : undefined}
        />
        <ChoiceList
          label="What became of it"
          value={fate}
          outset={14}
          onChange={(next) => change({ fate: next })}
          choices={moduleFates.map((value) => ({ value, title: moduleFateNames[value], meaning: meanings[value] }))}
        />
        <Field
          label={fate === 'went-back-in' ? 'What was advised, and why it was declined' : 'Note'}
          value={note}
          multiline
          lines={2}
          maxLength={300}
          onChangeText={(text) => change({ note: text })}
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
