import { View } from 'react-native';
import type { RepairWaitDto } from '@/shared/contract/repair';
import { firstName } from '../charge/card-model';
import { moment } from '../format/clock';
import { duration } from '../format/duration';
import { useFormats } from '../format/formats';
import { Link } from '../primitives/link';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';

/** The waits of a repair: how long it could do nothing but wait for its module, and who corrected that. */
export function WaitPart({
  waits,
  now,
  onCorrect,
}: {
  waits: readonly RepairWaitDto[];
  now: number;
  /** Null: nothing can be corrected now. */
  onCorrect: ((wait: RepairWaitDto) => void) | null;
}) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const at = (instant: string) => moment(Date.parse(instant), zone, now, marks);
  if (waits.length === 0) return null;
  return (
    <View>
      <Txt kind="heading" heading={2}>
        Waiting for its module
      </Txt>
      {waits.map((wait) => {
        const length = ((wait.to ? Date.parse(wait.to) : now) - Date.parse(wait.from)) / 1000;
        return (
          <View key={wait.id} style={styles.row}>
            <View style={styles.words}>
              <Txt
                bold
              >{`${duration(length, 'minute')}${wait.modulePosition ? `, module ${wait.modulePosition}` : ''}`}</Txt>
              <Txt kind="small" tone="ink2">
                {wait.to ? `${at(wait.from)} to ${at(wait.to)}` : `since ${at(wait.from)}, it waits still`}
              </Txt>
              {wait.corrected ? (
                <Txt kind="small" tone="ink2">
                  {`Corrected by ${firstName(wait.corrected.by.name)}, ${at(wait.corrected.at)}: ${wait.corrected.reason}`}
                </Txt>
              ) : null}
            </View>
            {onCorrect ? (
              <Link
                title="correct"
                label={`Correct the wait from ${at(wait.from)}`}
                align="right"
                onPress={() => onCorrect(wait)}
              />
            ) : null}
          </View>
        );
      })}
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  row: {
    flexDirection: 'row',
    alignItems: 'center',
    columnGap: 12,
    paddingVertical: 8,
    borderTopWidth: 1,
    borderTopColor: colors.line,
  },
  words: { flex: 1, minWidth: 0 },
}));
