import { memo } from 'react';
import { StyleSheet, View } from 'react-native';
import { StageGlyph } from '../stage/stage-glyph';
import { stages, type StageMark } from '../stage/stages';
import { useTheme } from '../theme/theme';
import { useReducedMotion } from '../theme/use-reduced-motion';
import type { ColorRole } from '../theme/tokens';
import { webStyle } from '../theme/web-props';
import { WallText } from './wall-text';

interface BlockSize {
  width: number;
  height: number;
  glyph: number;
  word: number;
  gap: number;
}

/** Ground and front of a block; the waiting stages stand on the well. */
function colorsOf(mark: StageMark): { back: ColorRole; front: ColorRole } {
  if (mark === 'queued' || mark === 'planned') return { back: 'well', front: 'ink' };
  const { color, onColor } = stages[mark];
  return { back: color, front: onColor };
}

/** The stage as a block: sign and word. An overdue one swaps its tone every 2 s until somebody has it in hand. */
export const StageBlock = memo(function StageBlock({ mark, size }: { mark: StageMark; size: BlockSize }) {
  const reduced = useReducedMotion();
  const { back, front } = colorsOf(mark);
  return (
    <View style={{ width: size.width, height: size.height, flexShrink: 0 }}>
      <Face mark={mark} back={back} front={front} size={size} />
      {mark === 'overdue' && !reduced ? (
        <View style={[styles.over, swap]} aria-hidden>
          <Face mark={mark} back="alarmTint" front="alarm" size={size} />
        </View>
      ) : null}
    </View>
  );
});

function Face({ mark, back, front, size }: { mark: StageMark; back: ColorRole; front: ColorRole; size: BlockSize }) {
  const { colors } = useTheme();
  const { word } = stages[mark];
  // The longest word of all is set a little smaller, so that it keeps to its block.
  const wordSize =
    word.length > 10
      ? Math.floor(size.word * Math.min(1, (size.width - 14) / (word.length * size.word * 0.425)))
      : size.word;
  return (
    <View style={[styles.face, { backgroundColor: colors[back], rowGap: size.gap }]}>
      <StageGlyph stage={mark} size={size.glyph} tone={front} />
      <WallText size={wordSize} strong tone={front}>
        {word}
      </WallText>
    </View>
  );
}

/** Two seconds each, as a cut: nothing on the wall blinks faster. */
const swap = webStyle({
  animationKeyframes: [{ '0%': { opacity: 0 }, '50%': { opacity: 1 }, '100%': { opacity: 1 } }],
  animationDuration: '4s',
  animationTimingFunction: 'step-end',
  animationIterationCount: 'infinite',
});

const styles = StyleSheet.create({
  face: { flex: 1, alignItems: 'center', justifyContent: 'center' },
  over: { position: 'absolute', top: 0, right: 0, bottom: 0, left: 0 },
});
