import { StyleSheet, View } from 'react-native';
import { Txt } from '../primitives/txt';
import { useTheme } from '../theme/theme';
import { radius, stroke } from '../theme/tokens';
import { StageGlyph } from './stage-glyph';
import { stages, type StageMark } from './stages';

/** Colour, shape and word of a stage, never the one without the other. `text` says more than the word alone. */
export function StageTag({ stage, text, size = 20 }: { stage: StageMark; text?: string; size?: number }) {
  const { colors } = useTheme();
  const { color, onColor, bare, word } = stages[stage];
  return (
    <View style={styles.tag}>
      <View
        style={[
          styles.block,
          !bare && { backgroundColor: colors[color] },
          stage === 'check-due' && { borderWidth: stroke.control, borderColor: colors.ink },
        ]}
      >
        <StageGlyph stage={stage} size={size * 0.7} tone={onColor} />
      </View>
      <Txt kind="label" nowrap style={styles.word}>
        {text ?? word}
      </Txt>
    </View>
  );
}

const styles = StyleSheet.create({
  tag: { flexDirection: 'row', alignItems: 'center', columnGap: 7 },
  block: { width: 22, height: 22, borderRadius: radius.mark, alignItems: 'center', justifyContent: 'center' },
  word: { lineHeight: 20 },
});
