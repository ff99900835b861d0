import type { ReactNode } from 'react';
import { BottomSheet } from './bottom-sheet';
import { Button } from './button';
import { Txt } from './txt';

/**
 * The confirm step before something that cannot be taken back. The safe choice is the ink button nearest the thumb;
 * the other stands above it as a line. Ask a reason in `children` and keep `ready` false until there is one.
 */
export function ConfirmSheet({
  open,
  title,
  fact,
  confirm,
  safe,
  ready = true,
  busy = false,
  why,
  onConfirm,
  onClose,
  children,
}: {
  open: boolean;
  title: string;
  /** What happens then, and to whom. */
  fact?: string;
  /** 'It is off: stop the charge' */
  confirm: string;
  /** 'Let it run' */
  safe: string;
  ready?: boolean;
  busy?: boolean;
  /** Why it cannot be confirmed yet; shown above the buttons. */
  why?: string;
  onConfirm: () => void;
  onClose: () => void;
  children?: ReactNode;
}) {
  return (
    <BottomSheet
      open={open}
      title={title}
      onClose={onClose}
      cross={false}
      scrimCloses={false}
      actions={
        <>
          {!ready && why ? (
            <Txt kind="small" tone="ink2">
              {why}
            </Txt>
          ) : null}
          <Button look="line" title={confirm} onPress={onConfirm} disabled={!ready} busy={busy} />
          <Button title={safe} onPress={onClose} />
        </>
      }
    >
      {fact ? <Txt tone="ink2">{fact}</Txt> : null}
      {children}
    </BottomSheet>
  );
}
