import { Path, Svg } from 'react-native-svg';
import { useTheme } from '../theme/theme';

/** Two vessels, one at the notch and one below it. */
export function BrandMark({ size = 46, label }: { size?: number; label?: string }) {
  const { colors } = useTheme();
  return (
    <Svg
      width={size}
      height={size}
      viewBox="0 0 48 48"
      fill="none"
      {...(label ? { role: 'img', 'aria-label': label } : { 'aria-hidden': true })}
    >
      <Path d="M8 4v40h13V4M27 4v40h13V4" stroke={colors.ink} strokeWidth={3.5} />
      <Path d="M9.5 20h10v22.5h-10zM28.5 27h10v15.5h-10z" fill={colors.charging} />
      <Path d="M2 18.2h44" stroke={colors.ink} strokeWidth={3.6} />
    </Svg>
  );
}
