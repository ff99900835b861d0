import { useState } from 'react';
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

/** The ways a charge ends by hand, but for a stop: fitted, back on the shelf, or dropped before it began. */
export function EndSheet({
  kind,
  charge,
  busy,
  problem,
  onClose,
  onConfirm,
}: {
  kind: EndKind;
  charge: ChargeDto;
  busy: boolean;
  problem: string | null;
  onClose: () => void;
  /** What was typed; null: nothing. */
  onConfirm: (text: string | null) => void;
}) {
  const words = wordsOf(kind, charge);
  const [text, setText] = useState(kind === 'shelve' ? (charge.shelfPlace ?? '') : '');
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
            onChangeText={setText}
            kind={kind === 'shelve' ? 'label' : 'text'}
            maxLength={kind === 'shelve' ? 30 : 300}
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
