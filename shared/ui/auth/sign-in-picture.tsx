import { StyleSheet, View } from 'react-native';
import { G, Path, Svg } from 'react-native-svg';
import { useTheme } from '../theme/theme';

/** Left edge and level of the four vessels, px of a picture 390 wide: three at the notch, one still below it. */
const vessels = [
  [40, 168],
  [126, 168],
  [212, 168],
  [298, 206],
] as const;

/** What `low` leaves away at the top, px: room for the demo's doors above the fold of a phone. */
const cut = 110;

/** The picture of the job over the sign-in: a module's groups against the notch. Decoration, so silent. */
export function SignInPicture({ height = 330, low = false }: { height?: number; low?: boolean }) {
  const { colors } = useTheme();
  return (
    <View style={styles.box} aria-hidden>
      <Svg
        width="100%"
        height={low ? height - cut : height}
        viewBox={low ? `0 ${cut} 390 ${330 - cut}` : '0 0 390 330'}
        preserveAspectRatio="xMidYMin meet"
        fill="none"
      >
        {vessels.map(([x, level]) => (
          <G key={x}>
            <Path d={`M${x} -400H${x + 52}V300H${x}z`} fill={colors.well} />
            <Path d={`M${x + 5} ${level}h42V295h-42z`} fill={colors.charging} />
            <Path d={`M${x} -400V300h52V-400`} stroke={colors.edge} strokeWidth={3} />
          </G>
        ))}
        <Path d="M-2000 168H390" stroke={colors.ground} strokeWidth={11} />
        <Path d="M-2000 168H366" stroke={colors.ink} strokeWidth={5} />
        <Path d="M364 168l18 -12v24z" fill={colors.ink} />
      </Svg>
    </View>
  );
}

const styles = StyleSheet.create({ box: { width: '100%', overflow: 'hidden' } });
