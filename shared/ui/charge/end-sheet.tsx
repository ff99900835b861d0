import { View } from 'react-native';
import type { ChargeDto } from '@/shared/contract/charge';
import { ConfirmSheet } from '../primitives/confirm-sheet';
import { Field } from '../primitives/field';
import { Txt } from '../primitives/txt';

export type EndKind = 'fit' | 'shelve' | 'drop';

interface EndWords {
  title: string;
  fact: string;
  confirm: string;
  safe: string;
  /** What may be typed with it. */
  field: string | null;
}

function wordsOf(kind: EndKind, charge: ChargeDto): EndWords {
  const spare = charge.spare.label;
  switch (kind) {
    case 'fit':
      return {
        title: `Fit ${spare}`,
        fact: `${spare}${charge.modulePosition ? ` goes in as module ${charge.modulePosition}` : ' goes in'}. It leaves the stock, and the charge is closed.`,
        confirm: 'It is fitted',
        safe: 'Not yet',
        field: 'Note',
      };
    case 'shelve': {
      const checked = charge.restChecks.length > 0;
      return {
        title: `Put ${spare} back`,
        fact: checked
          ? `${spare} goes back on the shelf with the voltages of its check. ${charge.title} then has no charge.`
          : `${spare} goes back on the shelf unchecked: its groups are read before it is planned again. ${charge.title} then has no charge.`,
        confirm: 'Back on the shelf',
        safe: 'Keep it here',
        field: 'Shelf place',
      };
    }
    case 'drop':
      return {
        title: 'Drop this charge',
        fact: `${spare} and its channel are free again. Nothing was clipped on.`,
        confirm: 'Drop it',
        safe: 'Keep it',
        field: null,
      };
  }
}

/** What is typed so far; null where nothing was. */
export interface EndDraft {
  note: string | null;
  shelfPlace: string | null;
}
export const noEndDraft: EndDraft = { note: null, shelfPlace: null };

/** The ways a charge ends by hand, but for a stop: fitted, back on the shelf, or dropped before it began. */
export function EndSheet({
  kind,
  charge,
  draft,
  busy,
  problem,
  onDraft,
  onClose,
  onConfirm,
}: {
  kind: EndKind;
  charge: ChargeDto;
  draft: EndDraft;
  busy: boolean;
  problem: string | null;
  onDraft: (draft: EndDraft) => void;
  onClose: () => void;
  /** What was typed; null: nothing. */
  onConfirm: (text: string | null) => void;
}) {
  const words = wordsOf(kind, charge);
  const shelve = kind === 'shelve';
  const text = shelve ? (draft.shelfPlace ?? charge.shelfPlace ?? '') : (draft.note ?? '');
  return (
    <ConfirmSheet
      open
      title={words.title}
      fact={words.fact}
      confirm={words.confirm}
      safe={words.safe}
      busy={busy}
      onConfirm={() => onConfirm(text.trim() || null)}
      onClose={onClose}
    >
      {words.field ? (
        <View style={{ marginTop: 12 }}>
          <Field
            label={words.field}
            value={text}
            onChangeText={(typed) => onDraft({ ...draft, [shelve ? 'shelfPlace' : 'note']: typed })}
            kind={shelve ? 'label' : 'text'}
            maxLength={shelve ? 30 : 300}
          />
        </View>
      ) : null}
      {problem ? (
        <Txt kind="label" tone="alarm" role="alert">
          {problem}
        </Txt>
      ) : null}
    </ConfirmSheet>
  );
}
