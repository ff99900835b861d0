import { useDraft } from '@/shared/client/drafts';
import { ConfirmSheet } from '@/shared/ui/primitives/confirm-sheet';
import { Field } from '@/shared/ui/primitives/field';
import { SheetFields } from '@/shared/ui/primitives/sheet-fields';
import { Txt } from '@/shared/ui/primitives/txt';
import { problemOfAct } from './act-problem';

const nothing = '';

/** A step that needs a reason in words, which is kept with the name. */
export function ReasonSheet({
  title,
  fact,
  confirm,
  safe,
  draft: name,
  busy,
  error,
  onConfirm,
  onClose,
}: {
  title: string;
  fact: string;
  confirm: string;
  safe: string;
  /** Name of the draft with its object. */
  draft: string;
  busy: boolean;
  error: unknown;
  /** @param done call when it was taken */
  onConfirm: (reason: string, done: () => void) => void;
  onClose: () => void;
}) {
  const draft = useDraft(name, nothing);
  const reason = draft.value.trim();
  const problem = problemOfAct(error);
  return (
    <ConfirmSheet
      open
      title={title}
      fact={fact}
      confirm={confirm}
      safe={safe}
      ready={reason !== ''}
      why="Say why first."
      busy={busy}
      onConfirm={() =>
        onConfirm(reason, () => {
          draft.clear();
          onClose();
        })
      }
      onClose={onClose}
    >
      <SheetFields under>
        <Field
          label="Reason"
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
