import { View } from 'react-native';
import type { BenchChangeDto } from '@/shared/contract/bench-plan';
import { firstName } from '../charge/card-model';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { Button } from '../primitives/button';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { SideSection } from './side-section';

/** The latest change of the plan, with the way back, or why there is none any more. */
export function LastChangePart({
  change,
  now,
  busy,
  offline,
  problem,
  onUndo,
}: {
  change: BenchChangeDto;
  now: number;
  busy: boolean;
  offline: boolean;
  /** Why it could not be taken back. */
  problem: string | null;
  onUndo: () => void;
}) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const lasting = change.lastingBecause;
  return (
    <SideSection
      title="Last change"
      aside={`${firstName(change.by.name)}, ${moment(Date.parse(change.at), zone, now, marks)}`}
    >
      <View style={styles.row}>
        <View style={styles.words}>
          <Txt>{change.text}</Txt>
          {lasting !== null || offline ? (
            <View nativeID="bench-undo-why">
              <Txt kind="small" tone="ink2">
                {lasting ?? 'Taking it back needs the connection.'}
              </Txt>
            </View>
          ) : null}
          {problem ? (
            <Txt kind="small" bold tone="alarm" role="alert">
              {problem}
            </Txt>
          ) : null}
        </View>
        <Button
          look="line"
          size="small"
          title="Undo"
          label={`Undo: ${change.text}`}
          onPress={onUndo}
          busy={busy}
          disabled={lasting !== null || offline}
          describedBy={lasting !== null || offline ? 'bench-undo-why' : undefined}
        />
      </View>
    </SideSection>
  );
}

const useStyles = makeStyles(() => ({
  row: { flexDirection: 'row', alignItems: 'flex-start', columnGap: 12, marginTop: 6 },
  words: { flex: 1, minWidth: 0, rowGap: 3 },
}));
