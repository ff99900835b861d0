import { useMemo } from 'react';
import { View } from 'react-native';
import { Circle, G, Path, Rect, Svg, Text as SvgText } from 'react-native-svg';
import { voltsAtSoc } from '@/calc';
import { Grid } from '../charts/grid';
import { ChartFrame } from '../charts/chart-frame';
import { useFormats } from '../format/formats';
import { NBSP } from '../format/marks';
import { fixed } from '../format/number';
import { clipVolts, clipVoltsNumber, range, share, volts, voltsNumber } from '../format/quantities';
import { FullWidth } from '../primitives/full-width';
import { Table } from '../primitives/table';
import { Txt } from '../primitives/txt';
import { useTheme } from '../theme/theme';
import { faceStacks } from '../theme/tokens';
import { drawnParameters, extremes, layoutCurve, worthShare, type CurveInput } from './curve-layout';

/** Heights of the two panels and what stands between and under them, px. */
const VOLTS = 300;
const BARS = 92;
const GAP = 58;

/**
 * The rest voltage of the type's curve against its charge, with the limits as they are typed, and what 5 mV is worth along it.
 * Loads late: it brings the curves of `calc`.
 */
export function CurvePicture(input: CurveInput) {
  const { marks } = useFormats();
  const parameters = drawnParameters(input);
  const { flat, steep } = extremes(parameters);
  const ah = input.ratedAh;
  const worth = (shareOf: number) =>
    ah === null
      ? `${fixed(shareOf * 100, 1, marks)}${NBSP}%`
      : `${fixed(shareOf * ah, shareOf * ah < 10 ? 2 : 0, marks)}${NBSP}Ah`;
  const ratio = flat.share / steep.share;
  return (
    <View style={{ rowGap: 10 }}>
      <ChartFrame
        heading="Rest voltage against charge"
        note="V of one group at 25 °C, along the charge in %; shaded where it is flattest"
        picture={
          <FullWidth height={VOLTS + GAP + BARS + 26}>{(width) => <Drawing input={input} width={width} />}</FullWidth>
        }
        table={
          <Table
            label="Rest voltage against charge"
            keepOnPhone
            rows={Array.from({ length: 21 }, (_, i) => i / 20)}
            rowKey={(soc) => String(soc)}
            columns={[
              { key: 'soc', title: 'Charge', cell: (soc) => share(soc) },
              {
                key: 'volts',
                title: 'Rests at, V',
                numeric: true,
                cell: (soc) => voltsNumber(voltsAtSoc(parameters.curve, soc), marks),
              },
              {
                key: 'worth',
                title: '5 mV is worth',
                numeric: true,
                cell: (soc) => worth(worthShare(parameters, soc)),
              },
            ]}
          />
        }
      />
      <Txt kind="small" tone="ink2">
        {`Around ${volts(flat.volts, marks)}, 5${NBSP}mV is worth ${worth(flat.share)}, ${
          ratio >= 10 ? `${Math.round(ratio)}` : fixed(ratio, 1, marks)
        } times what it is near ${volts(steep.volts, marks)}: a target there has a wider band.`}
      </Txt>
      <Txt kind="small" tone="ink2">
        {`Usual for this chemistry: charge to ${clipVolts(parameters.chargeLimitVolts, marks)}, not below ${clipVolts(
          parameters.dischargeLimitVolts,
          marks,
        )}, floor ${clipVolts(parameters.recoveryFloorVolts, marks)}, ${range(
          String(parameters.minChargeCelsius),
          String(parameters.maxChargeCelsius),
          '°C',
        )}, shelf at ${range(
          clipVoltsNumber(voltsAtSoc(parameters.curve, parameters.storageSoc.low), marks),
          clipVoltsNumber(voltsAtSoc(parameters.curve, parameters.storageSoc.high), marks),
          'V',
        )}. The maker’s limits come first.`}
      </Txt>
    </View>
  );
}

function Drawing({ input, width }: { input: CurveInput; width: number }) {
  const { colors } = useTheme();
  const { marks } = useFormats();
  const key = JSON.stringify(input);
  const drawing = useMemo(() => layoutCurve(JSON.parse(key) as CurveInput, width, VOLTS, BARS), [key, width]);
  const { left, limits, shelf, toX } = drawing;
  const local = (text: string) => (marks.decimal === ',' ? text.replace(/(\d)\.(\d)/, '$1,$2') : text);
  const narrow = width < 480;
  const height = VOLTS + GAP + BARS + 26;
  return (
    <Svg
      width={width}
      height={height}
      viewBox={`0 0 ${width} ${height}`}
      fill="none"
      role="img"
      aria-label={`Rest voltage rises with the charge. ${[
        ...limits.map(({ text }) => text),
        shelf ? `${shelf.text}, ${Math.round(shelf.soc * 100)} % charged` : '',
      ]
        .filter(Boolean)
        .join('; ')}.`}
    >
      <Grid lines={drawing.lines.map((line) => ({ ...line, text: local(line.text) }))} left={left} width={width} />
      <Rect x={drawing.flat.x} y={0} width={drawing.flat.width} height={VOLTS} fill={colors.well} />
      {narrow ? null : <Word x={drawing.flat.x + drawing.flat.width / 2} y={15} anchor="middle" text="flattest" />}
      {limits.map(({ key: name, y, text, below }) => (
        <G key={name}>
          <Path d={`M${left} ${y}H${width}`} stroke={colors.ink} strokeWidth={2} strokeDasharray={[7, 4]} />
          <Word x={width} y={below ? y + 16 : y - 7} anchor="end" text={local(text)} />
        </G>
      ))}
      <Path d={drawing.curve} stroke={colors.ink} strokeWidth={2.6} strokeLinejoin="round" />
      {drawing.dots.map(({ x, y }) => (
        <Circle key={x} cx={x} cy={y} r={3.5} fill={colors.ink} />
      ))}
      {shelf ? (
        <>
          <Path d={`M${left} ${shelf.y}H${shelf.x}V${VOLTS - 8}`} stroke={colors.ink} strokeWidth={3} />
          <Path d={`M${shelf.x} ${VOLTS}l-6.5 -10h13z`} fill={colors.ink} />
          <Word x={left + 8} y={shelf.y - 8} anchor="start" text={local(shelf.text)} bold />
        </>
      ) : null}
      <Word
        x={0}
        y={VOLTS + 32}
        anchor="start"
        bold
        text={input.ratedAh === null ? 'What 5 mV is worth, % of the charge' : 'What 5 mV is worth, Ah a group'}
      />
      <G transform={`translate(0 ${VOLTS + GAP})`}>
        <Grid lines={drawing.barLines.map((line) => ({ ...line, text: local(line.text) }))} left={left} width={width} />
        {drawing.bars.map((bar) => (
          <G key={bar.x}>
            <Rect x={bar.x} y={bar.y} width={bar.width} height={bar.height} fill={colors.ink2} />
            <SvgText
              x={bar.centre}
              y={bar.y - 5}
              textAnchor="middle"
              fill={colors.ink}
              fontFamily={faceStacks.num}
              fontWeight="600"
              fontSize={narrow ? 14 : 17}
            >
              {local(bar.text)}
            </SvgText>
          </G>
        ))}
        {[0, 0.2, 0.4, 0.6, 0.8, 1].map((soc) => (
          <G key={soc}>
            <Path d={`M${toX(soc)} ${BARS}v5`} stroke={colors.edge} strokeWidth={1} />
            <Word
              x={soc === 1 ? width : toX(soc)}
              y={BARS + 20}
              anchor={soc === 1 ? 'end' : 'middle'}
              text={soc === 1 ? '100 %' : String(Math.round(soc * 100))}
            />
          </G>
        ))}
      </G>
    </Svg>
  );
}

function Word({
  x,
  y,
  anchor,
  text,
  bold = false,
}: {
  x: number;
  y: number;
  anchor: 'start' | 'middle' | 'end';
  text: string;
  bold?: boolean;
}) {
  const { colors } = useTheme();
  return (
    <SvgText
      x={x}
      y={y}
      textAnchor={anchor}
      fill={bold ? colors.ink : colors.ink2}
      fontFamily={faceStacks.text}
      fontWeight={bold ? '600' : '400'}
      fontSize={13}
    >
      {text}
    </SvgText>
  );
}
