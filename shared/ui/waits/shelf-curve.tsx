import { View } from 'react-native';
import { Circle, Path, Svg, Text as SvgText } from 'react-native-svg';
import type { ShelfDto } from '@/shared/contract/waits-replay';
import { ChartFrame } from '../charts/chart-frame';
import { Grid } from '../charts/grid';
import { duration } from '../format/duration';
import { useFormats } from '../format/formats';
import { EN_DASH } from '../format/marks';
import { voltsNumber, volts } from '../format/quantities';
import { Table } from '../primitives/table';
import { Txt } from '../primitives/txt';
import { useTheme } from '../theme/theme';
import { faceStacks } from '../theme/tokens';
import { layoutShelf } from './shelf-layout';
import { useWidth } from './use-width';
import { chargesWord, hoursWord } from './wait-words';

const HEIGHT = 150;
const time = (minutes: number): string => duration(minutes * 60, 'minute');

/** Expected time on the charger against the shelf voltage, the best marked, and what it would cost to get there. */
export function ShelfCurve({ shelf, onCsv }: { shelf: ShelfDto; onCsv: () => void }) {
  const { width, onLayout } = useWidth();
  const { marks } = useFormats();
  const { best, now, window: kept } = shelf;
  const v = (value: number) => volts(value, marks);
  return (
    <View onLayout={onLayout} style={{ rowGap: 8 }}>
      <Txt bold>{`Best at ${v(best.volts)}: ${time(best.meanMinutes)} on the charger.`}</Txt>
      <Txt>
        {now === null
          ? 'No spare of this type is on the shelf now.'
          : now.meanMinutes === null
            ? `Now ${v(now.volts)}, the middle of ${spares(now.spares)}: from there some targets are out of reach of the present channels.`
            : `Now ${v(now.volts)}, the middle of ${spares(now.spares)}: ${time(now.meanMinutes)}.`}
      </Txt>
      {now === null ? null : (
        <Txt tone="ink2">
          {shelf.stockChargerHours === null
            ? 'Some of the present stock cannot be brought to the best with the present channels.'
            : `Bringing the present stock there takes ${hoursWord(shelf.stockChargerHours)} of the chargers.`}
        </Txt>
      )}
      <ChartFrame
        heading="Minutes against volts of a group"
        note={`Over ${chargesWord(shelf.charges)}; within the storage window, ${voltsNumber(kept.lowVolts, marks)}${EN_DASH}${v(kept.highVolts)}.`}
        onCsv={onCsv}
        picture={width === 0 ? null : <Curve shelf={shelf} width={width} />}
        table={
          <Table
            label="Time on the charger by shelf voltage"
            keepOnPhone
            rows={shelf.curve}
            rowKey={(point) => String(point.volts)}
            columns={[
              { key: 'volts', title: 'Shelf volts', cell: (point) => v(point.volts) },
              { key: 'time', title: 'On the charger', numeric: true, cell: (point) => time(point.meanMinutes) },
            ]}
          />
        }
      />
    </View>
  );
}

const spares = (count: number): string => (count === 1 ? '1 spare' : `${count} spares`);

function Curve({ shelf, width }: { shelf: ShelfDto; width: number }) {
  const { colors } = useTheme();
  const { left, lines, ticks, path, best, now } = layoutShelf(shelf, width, HEIGHT);
  const word = (x: number) => (x > width - 60 ? 'end' : x < 90 ? 'start' : 'middle');
  return (
    <Svg
      width={width}
      height={HEIGHT + 24}
      viewBox={`0 0 ${width} ${HEIGHT + 24}`}
      fill="none"
      role="img"
      aria-label={`From ${time(shelf.curve[0]?.meanMinutes ?? 0)} at the lowest to ${time(shelf.curve.at(-1)?.meanMinutes ?? 0)} at the highest volts, least ${time(shelf.best.meanMinutes)}.`}
    >
      <Grid lines={lines} left={left} width={width} />
      <Path d={path} stroke={colors.ink} strokeWidth={2.2} strokeLinejoin="round" />
      {now ? <Circle cx={now.x} cy={now.y} r={5} fill={colors.sheet} stroke={colors.ink} strokeWidth={2.2} /> : null}
      <Circle cx={best.x} cy={best.y} r={5.5} fill={colors.ink} />
      {now ? (
        <SvgText x={now.x} y={now.y - 10} textAnchor={word(now.x)} fill={colors.ink2} {...face}>
          now
        </SvgText>
      ) : null}
      <SvgText x={best.x} y={best.y - 10} textAnchor={word(best.x)} fill={colors.ink} {...face} fontWeight="600">
        best
      </SvgText>
      {ticks.map(({ x, text }) => (
        <SvgText key={text} x={x} y={HEIGHT + 18} textAnchor="middle" fill={colors.ink2} {...face}>
          {text}
        </SvgText>
      ))}
    </Svg>
  );
}

const face = { fontFamily: faceStacks.text, fontSize: 13 } as const;
