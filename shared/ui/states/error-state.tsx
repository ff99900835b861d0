import { StyleSheet, View } from 'react-native';
import { Button } from '../primitives/button';
import { CallOut } from '../primitives/call-out';
import { Txt } from '../primitives/txt';
import { StageTag } from '../stage/stage-tag';

/** Something failed: what, what is safe, what to do. A form around it keeps what was typed. */
export function ErrorState({
  failed,
  safe,
  toDo,
  action,
  reference,
}: {
  /** 'The bench could not be read.' */
  failed: string;
  /** 'The charges go on as they were set.' */
  safe?: string;
  /** 'Check the connection of this phone.' */
  toDo?: string;
  action?: { title: string; onPress: () => void; busy?: boolean };
  /** A request id to tell whoever looks after the installation. */
  reference?: string;
}) {
  return (
    <CallOut tone="red" announce>
      <StageTag stage="overdue" text="That failed" />
      <View style={styles.words}>
        <Txt bold>{failed}</Txt>
        {safe ? <Txt>{safe}</Txt> : null}
        {toDo ? <Txt>{toDo}</Txt> : null}
        {reference ? <Txt kind="small" tone="ink2">{`Reference ${reference}`}</Txt> : null}
      </View>
      {action ? <Button look="line" title={action.title} onPress={action.onPress} busy={action.busy} /> : null}
    </CallOut>
  );
}

const styles = StyleSheet.create({ words: { marginTop: 8, marginBottom: 12, rowGap: 4 } });
