import { View } from 'react-native';
import type { ActiveSessionDto } from '@/shared/contract/session';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { BottomSheet } from '../primitives/bottom-sheet';
import { Button } from '../primitives/button';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';

/** Where the person is signed in, and the way to end all of it. */
export function SessionsSheet({
  open,
  sessions,
  failed,
  now,
  busy,
  onEverywhere,
  onClose,
}: {
  open: boolean;
  sessions: readonly ActiveSessionDto[] | undefined;
  failed: string | null;
  now: number;
  busy: boolean;
  onEverywhere: () => void;
  onClose: () => void;
}) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  return (
    <BottomSheet
      open={open}
      onClose={onClose}
      title="Signed in on"
      actions={<Button title="Sign out everywhere" look="line" busy={busy} onPress={onEverywhere} />}
    >
      {failed ? <Txt tone="alarm">{failed}</Txt> : null}
      <View role="list">
        {(sessions ?? []).map((session) => (
          <View key={session.id} role="listitem" style={styles.row}>
            <Txt style={styles.device} bold={session.current}>
              {session.device}
            </Txt>
            <Txt kind="small" tone="ink2" nowrap>
              {session.current ? 'this one' : `seen ${moment(Date.parse(session.lastUsedAt), zone, now, marks)}`}
            </Txt>
          </View>
        ))}
      </View>
    </BottomSheet>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  row: {
    flexDirection: 'row',
    alignItems: 'center',
    columnGap: 12,
    minHeight: 48,
    borderTopWidth: 1,
    borderTopColor: colors.line,
  },
  device: { flex: 1, minWidth: 0 },
}));
