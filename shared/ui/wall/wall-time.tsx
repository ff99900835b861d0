import { View } from 'react-native';
import { NBSP } from '../format/marks';
import type { ColorRole } from '../theme/tokens';
import type { WallTime as Time } from './wall-model';
import { WallPart, WallText } from './wall-text';

/** The large word at the right of a row and the small one under it. */
export function TimeOfRow({
  time,
  size,
  line,
  small,
  smallLine,
  tone,
  smallTone,
}: {
  time: Time;
  size: number;
  line: number;
  small: number;
  smallLine: number;
  tone: ColorRole;
  smallTone: ColorRole;
}) {
  return (
    <View style={{ flex: 1, alignItems: 'flex-end' }}>
      <WallText size={size} line={line} strong tone={tone}>
        {time.large}
        {time.unit ? <WallPart share={0.45} size={size}>{`${NBSP}${time.unit}`}</WallPart> : null}
      </WallText>
      <WallText size={small} line={smallLine} tone={smallTone}>
        {time.small}
      </WallText>
    </View>
  );
}

/** Tones of a row's time: old times are ink3 all of them, an overdue one is alarm. */
export const timeTones = (overdue: boolean, stale: boolean): { tone: ColorRole; smallTone: ColorRole } =>
  stale
    ? { tone: 'ink3', smallTone: 'ink3' }
    : overdue
      ? { tone: 'alarm', smallTone: 'ink' }
      : { tone: 'ink', smallTone: 'ink2' };
