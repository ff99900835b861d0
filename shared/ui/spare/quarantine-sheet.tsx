import type { SpareDto } from '@/shared/contract/spare';
import { ChoiceList } from '../primitives/choice-row';
import { ConfirmSheet } from '../primitives/confirm-sheet';
import { Field } from '../primitives/field';
import { Txt } from '../primitives/txt';

export interface QuarantineInput {
  reason: string;
  /** What was seen, where it is a condition of the module; null leaves its condition as it is. */
  condition: SpareDto['condition'] | null;
  shelfPlace: string;
}

/** What is chosen and typed so far; a place of null stands for the spare's own. */
export interface QuarantineDraft {
  chosen: Seen | null;
  words: string;
  place: string | null;
}
export const noQuarantineDraft: QuarantineDraft = { chosen: null, words: '', place: null };

type Seen = 'swollen' | 'leaking' | 'dented' | 'water' | 'deep-discharged' | 'other';
const seen: readonly { value: Seen; title: string }[] = [
  { value: 'swollen', title: 'Swollen' },
  { value: 'leaking', title: 'Leaking, or smells' },
  { value: 'dented', title: 'Dented' },
  { value: 'water', title: 'Water got in' },
  { value: 'deep-discharged', title: 'A group under its floor' },
  { value: 'other', title: 'Something else' },
];

/** Set a spare aside: what was seen, and where it goes. Nothing is preselected. */
export function QuarantineSheet({
  spare,
  fact,
  draft,
  busy,
  problem,
  onDraft,
  onConfirm,
  onClose,
}: {
  spare: Pick<SpareDto, 'label' | 'shelfPlace'>;
  /** What else falls away: its plan. */
  fact: string;
  draft: QuarantineDraft;
  busy: boolean;
  problem: string | null;
  onDraft: (draft: QuarantineDraft) => void;
  onConfirm: (input: QuarantineInput) => void;
  onClose: () => void;
}) {
  const { chosen, words } = draft;
  const place = draft.place ?? spare.shelfPlace ?? '';
  const title = seen.find(({ value }) => value === chosen)?.title ?? '';
  const reason = chosen === 'other' ? words.trim() : title;
  return (
    <ConfirmSheet
      open
      title={`Quarantine ${spare.label}`}
      fact={fact}
      confirm="Put in quarantine"
      safe="Keep it on the shelf"
      ready={reason !== ''}
      why={chosen === 'other' ? 'Say what was seen first.' : 'Choose what was seen first.'}
      busy={busy}
      onConfirm={() =>
        onConfirm({ reason, condition: chosen === null || chosen === 'other' ? null : chosen, shelfPlace: place })
      }
      onClose={onClose}
    >
      <Txt kind="label" style={{ marginTop: 12 }}>
        What was seen
      </Txt>
      <ChoiceList
        label="What was seen"
        value={chosen}
        onChange={(next) => onDraft({ ...draft, chosen: next })}
        outset={14}
        choices={seen}
      />
      {chosen === 'other' ? (
        <Field
          label="In a few words"
          value={words}
          onChangeText={(typed) => onDraft({ ...draft, words: typed })}
          maxLength={300}
          autoFocus
        />
      ) : null}
      <Field
        label="Where it goes"
        kind="label"
        value={place}
        onChangeText={(typed) => onDraft({ ...draft, place: typed })}
        maxLength={30}
      />
      {problem ? (
        <Txt tone="alarm" bold role="alert">
          {problem}
        </Txt>
      ) : null}
    </ConfirmSheet>
  );
}
