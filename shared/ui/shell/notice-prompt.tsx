import { BottomSheet } from '../primitives/bottom-sheet';
import { Button } from '../primitives/button';
import { Txt } from '../primitives/txt';

/** Our own question before the browser's, which a person can refuse only once. Asked after the first started charge. */
export function NoticePrompt({
  askNow,
  ask,
  decline,
}: {
  askNow: boolean;
  ask: () => Promise<unknown>;
  decline: () => void;
}) {
  return (
    <BottomSheet
      open={askNow}
      onClose={decline}
      title="Tell you when it is done?"
      cross={false}
      actions={
        <>
          <Button title="Tell me on this device" onPress={() => void ask()} />
          <Button title="Not on this device" look="line" onPress={decline} />
        </>
      }
    >
      <Txt>
        While this page is open in the background, this device can show a notice when a check is due, a module is ready
        or a charge runs late. The browser asks next. You can change it under More.
      </Txt>
    </BottomSheet>
  );
}
