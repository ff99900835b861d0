import { useId, useState } from 'react';
import { View } from 'react-native';
import { ProblemLine } from '../auth/problem-line';
import { Button } from '../primitives/button';
import { ConfirmSheet } from '../primitives/confirm-sheet';
import { Txt } from '../primitives/txt';

/** Removes a small thing of the settings, after a confirm step. */
export function RemoveThing({
  name,
  thing,
  fact,
  why = null,
  busy,
  problem,
  onRemove,
}: {
  name: string;
  /** 'meter' */
  thing: string;
  fact: string;
  /** Why it cannot be removed. */
  why?: string | null;
  busy: boolean;
  problem: string | null;
  /** `done` closes the sheet, whatever came of it. */
  onRemove: (done: () => void) => void;
}) {
  const [asked, setAsked] = useState(false);
  const id = useId();
  const close = () => setAsked(false);
  return (
    <View style={{ rowGap: 6 }}>
      {why ? (
        <Txt kind="small" tone="ink2" nativeID={id}>
          {why}
        </Txt>
      ) : null}
      <Button
        look="line"
        title={`Remove the ${thing}`}
        disabled={why !== null}
        describedBy={why ? id : undefined}
        onPress={() => setAsked(true)}
      />
      <ProblemLine text={problem} />
      <ConfirmSheet
        open={asked}
        title={`Remove ${name}?`}
        fact={fact}
        confirm={`Remove the ${thing}`}
        safe="Keep it"
        busy={busy}
        onClose={close}
        onConfirm={() => onRemove(close)}
      />
    </View>
  );
}
