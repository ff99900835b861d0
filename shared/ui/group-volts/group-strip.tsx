import { Pressable, View } from 'react-native';
import type { FieldVerdict } from '../primitives/field-frame';
import { Txt } from '../primitives/txt';
import { innerFrame } from '../theme/frame';
import { makeStyles } from '../theme/make-styles';
import { radius, stroke } from '../theme/tokens';
import { web } from '../theme/web-props';

/** All groups at a glance over the pad: what is typed, what is open, what is outside. A tap goes there. */
export function GroupStrip({
  values,
  count,
  present,
  verdictOf,
  onGo,
}: {
  values: readonly string[];
  count: number;
  present: number;
  verdictOf?: (group: number) => FieldVerdict | null;
  onGo: (group: number) => void;
}) {
  const styles = useStyles();
  // Rows of equal length where that can be.
  const inRow = count % 5 === 0 ? 5 : 4;
  return (
    <View style={styles.strip} role="list" aria-label="Groups">
      {Array.from({ length: count }, (_, group) => {
        const value = (values[group] ?? '').trim();
        const outside = verdictOf?.(group)?.inside === false;
        return (
          <View key={group} role="listitem" style={[styles.cell, { width: `${100 / inRow}%` }]}>
            <Pressable
              role="button"
              aria-label={`Group ${group + 1}, ${value === '' ? 'open' : value}${outside ? ', outside' : ''}`}
              onPress={() => onGo(group)}
              {...web({ 'aria-current': group === present ? 'step' : undefined, dataSet: { press: '' } })}
              style={({ pressed }) => [styles.box, group === present && styles.chosen, pressed && styles.pressed]}
            >
              <Txt kind="small" tone="ink2">{`G${group + 1}`}</Txt>
              <Txt kind="numXS" tone={value === '' ? 'ink3' : outside ? 'alarm' : 'ink'} nowrap>
                {value === '' ? 'open' : value}
              </Txt>
            </Pressable>
          </View>
        );
      })}
    </View>
  );
}

const useStyles = makeStyles((theme) => ({
  strip: { flexDirection: 'row', flexWrap: 'wrap', rowGap: 6, marginHorizontal: -3 },
  cell: { paddingHorizontal: 3 },
  box: {
    minHeight: 48,
    alignItems: 'center',
    justifyContent: 'center',
    borderRadius: radius.control,
    ...innerFrame(theme, 1, theme.colors.line),
  },
  chosen: innerFrame(theme, stroke.chosen, theme.colors.ink),
  pressed: { backgroundColor: theme.colors.well },
}));
