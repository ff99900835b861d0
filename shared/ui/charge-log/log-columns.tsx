import { View } from 'react-native';
import type { LogChoices, LogPreviewDto } from '@/shared/contract/charge-log';
import { logUnits, logUseWords, type LogUse } from '@/shared/contract/charge-log-words';
import { Select } from '../primitives/select';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';

const uses = Object.entries(logUseWords).map(([value, label]) => ({ value: value as LogUse, label }));

/** Each column of the file with its first numbers, and what it is taken for; every choice is the person's. */
export function LogColumns({
  columns,
  choices,
  onChange,
}: {
  columns: LogPreviewDto['columns'];
  choices: LogChoices;
  onChange: (columns: LogChoices['columns']) => void;
}) {
  const styles = useStyles();
  const change = (at: number, column: LogChoices['columns'][number]) =>
    onChange(choices.columns.map((before, index) => (index === at ? column : before)));
  return (
    <View role="list" aria-label="Columns of the file">
      {choices.columns.map(({ use, unit }, at) => {
        const name = columns[at]?.name ?? `Column ${at + 1}`;
        const units = logUnits[use].map(([value, label]) => ({ value, label }));
        return (
          <View key={at} role="listitem" style={styles.row}>
            <View style={styles.part}>
              <Select
                size="low"
                label={name}
                hint={columns[at]?.samples.join(' · ') || 'Nothing in the first lines'}
                value={use}
                options={uses}
                onChange={(next) => change(at, { use: next, unit: logUnits[next][0]?.[0] ?? '' })}
              />
            </View>
            <View style={styles.part}>
              {units.length > 0 ? (
                <Select
                  size="low"
                  label={`${name} counts in`}
                  value={unit}
                  options={units}
                  onChange={(next) => change(at, { use, unit: next })}
                />
              ) : (
                <Txt kind="small" tone="ink2" style={styles.left}>
                  Left as it is in the file.
                </Txt>
              )}
            </View>
          </View>
        );
      })}
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  row: {
    flexDirection: 'row',
    flexWrap: 'wrap',
    columnGap: 12,
    paddingVertical: 10,
    borderBottomWidth: 1,
    borderBottomColor: colors.line,
  },
  part: { flexGrow: 1, flexBasis: 150, minWidth: 0 },
  left: { marginTop: 36 },
}));
