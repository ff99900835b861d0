import { Pressable, View, type StyleProp, type ViewStyle } from 'react-native';
import { innerFrame } from '../theme/frame';
import { makeStyles } from '../theme/make-styles';
import { radius, stroke, touch } from '../theme/tokens';
import { web, type WebKeyEvent } from '../theme/web-props';
import { pressOnSpace } from './pressing';
import { Txt } from './txt';
import { focusSibling, steppedIndex } from './walk';

export interface Segment<V extends string> {
  value: V;
  label: string;
  count?: number;
}

/**
 * One 48 px box, two to four words, the chosen one ink. For filters and ways of entry; never for yes or no. Over four
 * words take a `Select`.
 */
export function SegmentSwitch<V extends string>({
  label,
  value,
  segments,
  onChange,
  fit = 'even',
  style,
}: {
  /** Names the group for readers; not drawn. */
  label: string;
  value: V;
  segments: readonly Segment<V>[];
  onChange: (value: V) => void;
  /** 'even' widths, or as wide as the words ('words'). */
  fit?: 'even' | 'words';
  style?: StyleProp<ViewStyle>;
}) {
  const styles = useStyles();
  const walk = (event: WebKeyEvent, at: number) => {
    const next = steppedIndex(event.key, at, segments.length);
    const segment = next === null ? undefined : segments[next];
    if (next === null || !segment) return;
    event.preventDefault();
    onChange(segment.value);
    focusSibling(event, next);
  };
  return (
    <View role="radiogroup" aria-label={label} style={[styles.group, style]}>
      {segments.map((segment, index) => {
        const on = segment.value === value;
        return (
          <Pressable
            key={segment.value}
            role="radio"
            aria-checked={on}
            {...web({
              tabIndex: on ? 0 : -1,
              onKeyDown: (event) => {
                pressOnSpace(event, () => onChange(segment.value));
                walk(event, index);
              },
              dataSet: { press: '' },
            })}
            onPress={() => onChange(segment.value)}
            style={({ pressed }) => [
              styles.segment,
              fit === 'even' ? styles.even : styles.words,
              pressed && !on && styles.pressed,
              on && styles.on,
            ]}
          >
            <Txt kind="label" tone={on ? 'onInk' : 'ink'} nowrap style={styles.word}>
              {segment.count === undefined ? segment.label : `${segment.label} ${segment.count}`}
            </Txt>
          </Pressable>
        );
      })}
    </View>
  );
}

const useStyles = makeStyles((theme) => ({
  group: {
    flexDirection: 'row',
    minHeight: touch.min,
    borderRadius: radius.control,
    ...innerFrame(theme, stroke.control, theme.colors.edge),
    overflow: 'hidden',
  },
  segment: { minHeight: touch.min, alignItems: 'center', justifyContent: 'center' },
  even: { flexGrow: 1, flexShrink: 1, flexBasis: 0 },
  words: { flexGrow: 1, flexShrink: 1, paddingHorizontal: 12 },
  pressed: { backgroundColor: theme.colors.well },
  on: { backgroundColor: theme.colors.ink },
  word: { fontSize: 15, lineHeight: 20 },
}));
