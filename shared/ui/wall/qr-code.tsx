import { create } from 'qrcode';
import { useMemo } from 'react';
import { Path, Rect, Svg } from 'react-native-svg';
import { useTheme } from '../theme/theme';

/** Modules of a quiet zone, as the standard asks for. */
const quiet = 4;

/** The dark modules of a QR code (level M) as one path, and its side in modules with the quiet zone. */
export function qrPath(text: string): { d: string; side: number } {
  const { modules } = create(text, { errorCorrectionLevel: 'M' });
  let d = '';
  for (let y = 0; y < modules.size; y++)
    for (let x = 0; x < modules.size; x++) if (modules.get(y, x)) d += `M${x + quiet} ${y + quiet}h1v1h-1z`;
  return { d, side: modules.size + 2 * quiet };
}

/** A QR code, dark on light in every theme. */
export function QrCode({ text, size, label }: { text: string; size: number; label: string }) {
  const { name, colors } = useTheme();
  const { d, side } = useMemo(() => qrPath(text), [text]);
  const [light, dark] = name === 'night' ? [colors.ink, colors.onInk] : [colors.sheet, colors.ink];
  return (
    <Svg width={size} height={size} viewBox={`0 0 ${side} ${side}`} role="img" aria-label={label}>
      <Rect width={side} height={side} fill={light} />
      <Path d={d} fill={dark} />
    </Svg>
  );
}
