import { View } from 'react-native';
import { Button } from '../primitives/button';
import { Txt } from '../primitives/txt';
import { Foot } from '../screen/foot';

/** The one button of a form, and over it why it was not taken or cannot be sent. */
export function FormFoot({
  title,
  busy,
  offline,
  problem,
  note,
  onSend,
}: {
  title: string;
  busy: boolean;
  offline: boolean;
  /** Red and read out. */
  problem: string | null;
  /** Quiet: what sending brings. */
  note?: string;
  onSend: () => void;
}) {
  const quiet = offline ? 'No connection: what you typed is kept here and can be sent when it is back.' : note;
  return (
    <Foot
      noteId="form-note"
      note={
        problem || quiet ? (
          <View>
            {problem ? (
              <Txt kind="label" tone="alarm" role="alert">
                {problem}
              </Txt>
            ) : null}
            {quiet ? (
              <Txt kind="small" tone="ink2">
                {quiet}
              </Txt>
            ) : null}
          </View>
        ) : undefined
      }
    >
      <Button title={title} busy={busy} disabled={offline} describedBy="form-note" onPress={onSend} />
    </Foot>
  );
}
