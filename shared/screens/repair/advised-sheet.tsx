import { useDraft } from '@/shared/client/drafts';
import { useAddAdvised, useChangeAdvised, useRemoveAdvised } from '@/shared/client/repairs';
import {
  advisedOutcomeNames,
  advisedOutcomes,
  type AdvisedDto,
  type AdvisedOutcome,
  type RepairDto,
} from '@/shared/contract/repair';
import { ChoiceList } from '@/shared/ui/primitives/choice-row';
import { ConfirmSheet } from '@/shared/ui/primitives/confirm-sheet';
import { Field } from '@/shared/ui/primitives/field';
import { Link } from '@/shared/ui/primitives/link';
import { SheetFields } from '@/shared/ui/primitives/sheet-fields';
import { Txt } from '@/shared/ui/primitives/txt';
import { problemOfAct } from './act-problem';

interface AdvisedTyped {
  text: string;
  outcome: AdvisedOutcome | null;
  detail: string;
  agreedBy: string;
}
const nothing: AdvisedTyped = { text: '', outcome: null, detail: '', agreedBy: '' };

const meanings: Record<AdvisedOutcome, string> = {
  open: 'The owner has not said yes or no.',
  done: 'It was done with this repair.',
  booked: 'It is agreed for another day.',
  declined: 'Advised, and not wanted. It needs the owner’s name.',
};

const orNull = (text: string): string | null => (text.trim() === '' ? null : text.trim());

/** One thing that the owner was advised, and what became of it. Nothing is preselected. */
export function AdvisedSheet({
  repair,
  item,
  onClose,
}: {
  repair: RepairDto;
  /** Null: a new one. */
  item: AdvisedDto | null;
  onClose: () => void;
}) {
  const add = useAddAdvised();
  const change = useChangeAdvised();
  const remove = useRemoveAdvised();
  const draft = useDraft<Partial<AdvisedTyped>>(`repair.advised.${repair.id}.${item?.id ?? 'new'}`, nothingTyped);
  const stored: AdvisedTyped =
    item === null
      ? nothing
      : { text: item.text, outcome: item.outcome, detail: item.detail ?? '', agreedBy: item.agreedBy ?? '' };
  const typed: AdvisedTyped = { ...stored, ...draft.value };
  const { outcome } = typed;
  const needsName = outcome === 'declined' && typed.agreedBy.trim() === '';
  const problem = problemOfAct(add.error ?? change.error ?? remove.error);
  const set = (next: Partial<AdvisedTyped>) => draft.set((last) => ({ ...last, ...next }));
  const done = {
    onSuccess: () => {
      draft.clear();
      onClose();
    },
  };
  const keep = () => {
    if (outcome === null) return;
    const input = {
      text: typed.text.trim(),
      outcome,
      detail: orNull(typed.detail),
      agreedBy: orNull(typed.agreedBy),
    };
    if (item === null) add.mutate({ id: repair.id, ...input }, done);
    else change.mutate({ id: repair.id, rev: repair.rev, itemId: item.id, ...input }, done);
  };
  return (
    <ConfirmSheet
      open
      title="What is advised"
      confirm="Keep it"
      safe="Not now"
      ready={typed.text.trim() !== '' && outcome !== null && !needsName}
      why={
        typed.text.trim() === ''
          ? 'Type what is advised first.'
          : outcome === null
            ? 'Choose what became of it first.'
            : 'Type the name of the customer who declined it.'
      }
      busy={add.isPending || change.isPending || remove.isPending}
      onConfirm={keep}
      onClose={onClose}
    >
      <SheetFields>
        <Field label="What is advised" value={typed.text} maxLength={80} onChangeText={(text) => set({ text })} />
        <ChoiceList
          label="What became of it"
          value={outcome}
          outset={14}
          onChange={(next) => set({ outcome: next })}
          choices={advisedOutcomes.map((value) => ({
            value,
            title: advisedOutcomeNames[value],
            meaning: meanings[value],
          }))}
        />
        <Field
          label="Detail"
          hint="When, or why"
          value={typed.detail}
          maxLength={80}
          onChangeText={(detail) => set({ detail })}
        />
        <Field
          label="The customer’s name, as agreement"
          hint="Stands on the hand-over sheet with the time"
          value={typed.agreedBy}
          maxLength={80}
          onChangeText={(agreedBy) => set({ agreedBy })}
        />
        {item ? (
          <Link
            title="Take it back"
            label={`Take back ${item.text}`}
            onPress={() => remove.mutate({ id: repair.id, rev: repair.rev, itemId: item.id }, done)}
          />
        ) : null}
        {problem ? (
          <Txt tone="alarm" bold role="alert">
            {problem}
          </Txt>
        ) : null}
      </SheetFields>
    </ConfirmSheet>
  );
}

const nothingTyped: Partial<AdvisedTyped> = {};
