import { useMemo } from 'react';
import { G, Path, Rect, Svg, Text as SvgText } from 'react-native-svg';
import { labelSize, layoutLabel, type LabelInput } from '@/shared/contract/label-layout';
import { faceStacks } from '../theme/tokens';
import { qrPath } from '../wall/qr-code';

// Thermal paper knows two colours in every theme.
const paper = 'white';
const ink = 'black';

/**
 * The label as one drawing in millimetres: on screen as wide as its place, on paper 62 × 40 mm.
 *
 * @param url what the QR code opens; without an origin it is under the address of this page
 * @param width '62mm' on paper
 */
export function LabelSheet({ label, url, width }: { label: LabelInput; url: string; width: number | string }) {
  const layout = useMemo(() => layoutLabel(label), [label]);
  const code = useMemo(() => qrPath(new URL(url, window.location.origin).href), [url]);
  const { rule, qr, mark, texts } = layout;
  const height = typeof width === 'number' ? (width * labelSize.height) / labelSize.width : `${labelSize.height}mm`;
  return (
    <Svg
      width={width}
      height={height}
      viewBox={`0 0 ${labelSize.width} ${labelSize.height}`}
      role="img"
      aria-label={[
        'Label with the QR code of the charge',
        label.title,
        label.spare,
        label.position,
        label.line,
        label.ready,
      ]
        .filter(Boolean)
        .join(', ')}
    >
      <Rect width={labelSize.width} height={labelSize.height} fill={paper} />
      <G transform={`translate(${qr.x} ${qr.y}) scale(${qr.size / code.side})`}>
        <Path d={code.d} fill={ink} />
      </G>
      <Path d={`M${rule.x0} ${rule.y}H${rule.x1}`} stroke={ink} strokeWidth={rule.stroke} />
      {texts.map(({ key, text, x, y, size, weight, align }) => (
        <SvgText
          key={key}
          x={x}
          y={y}
          fontFamily={faceStacks.num}
          fontSize={size}
          fontWeight={weight}
          textAnchor={align}
          fill={ink}
        >
          {text}
        </SvgText>
      ))}
      <G transform={`translate(${mark.x} ${mark.y}) scale(${mark.size / 48})`}>
        <Path d="M8 4v40h13V4M27 4v40h13V4" stroke={ink} strokeWidth={3.5} fill="none" />
        <Path d="M9.5 20h10v22.5h-10zM28.5 27h10v15.5h-10z" fill={ink} />
        <Path d="M2 18.2h44" stroke={ink} strokeWidth={3.6} />
      </G>
    </Svg>
  );
}
