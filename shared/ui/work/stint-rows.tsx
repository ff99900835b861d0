import type { ReactNode } from 'react';
import { View } from 'react-native';
import type { StintDto } from '@/shared/contract/work';
import { firstName } from '../charge/card-model';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { EN_DASH } from '../format/marks';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';

const stateWords = { taken: 'Taken', begun: 'Begun', done: 'Done', 'given-back': 'Given back' } as const;

/** Who has how much of it, and who had: the stretches in which it is done. */
export function StintRows({
  stints,
  now,
  actsOf,
}: {
  stints: readonly StintDto[];
  now: number;
  /** What can be done with a stint, under its words; null: nothing. */
  actsOf: (stint: StintDto) => ReactNode;
}) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const at = (instant: string) => moment(Date.parse(instant), zone, now, marks);
  return (
    <View role="list" aria-label="Who does it">
      {stints.map((stint) => {
        const facts = [
          stint.givenBy ? `given by ${firstName(stint.givenBy.name)}` : null,
          stint.waitOf ? `in the wait for ${stint.waitOf.title}` : null,
        ];
        return (
          <View key={stint.id} role="listitem" style={styles.row}>
            <View style={styles.line}>
              <Txt bold style={styles.shrink}>
                {stint.person.name}
              </Txt>
              <Txt nowrap tone="ink2">{`${at(stint.from)}${EN_DASH}${at(stint.to)}`}</Txt>
            </View>
            <Txt kind="small" tone="ink2">
              {[stateWords[stint.state], ...facts].filter(Boolean).join(' · ')}
            </Txt>
            {actsOf(stint)}
          </View>
        );
      })}
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  row: { paddingVertical: 10, borderTopWidth: 1, borderTopColor: colors.line, rowGap: 2 },
  line: { flexDirection: 'row', justifyContent: 'space-between', alignItems: 'baseline', columnGap: 12 },
  shrink: { flexShrink: 1 },
}));
