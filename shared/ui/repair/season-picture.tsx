import { StyleSheet, View } from 'react-native';
import { Rect, Svg } from 'react-native-svg';
import type { RepairSeasonDto, SeasonPart } from '@/shared/contract/repair-season';
import { ChartFrame } from '../charts/chart-frame';
import { duration } from '../format/duration';
import { Table } from '../primitives/table';
import { Txt } from '../primitives/txt';
import { useTheme } from '../theme/theme';
import type { ColorRole } from '../theme/tokens';
import { useWidth } from '../waits/use-width';

/** As the ribbon of a charge: current full, rest low, what waits for somebody flat. A share of the height, and a hue. */
const looks: Record<SeasonPart, { high: number; color: ColorRole }> = {
  unread: { high: 0.1, color: 'ink3' },
  deciding: { high: 0.5, color: 'ink2' },
  unplanned: { high: 0.1, color: 'ink3' },
  queue: { high: 0.1, color: 'queued' },
  charging: { high: 1, color: 'charging' },
  tapering: { high: 0.7, color: 'tapering' },
  resting: { high: 0.24, color: 'resting' },
  'check-due': { high: 0.5, color: 'checkDue' },
  held: { high: 0.24, color: 'held' },
  unfitted: { high: 0.1, color: 'ready' },
  balancing: { high: 0.5, color: 'ready' },
  done: { high: 0.1, color: 'ready' },
};
const HEIGHT = 64;

/** The whole repair as one ribbon, from its booking to its hand-over, and where its time went. */
export function SeasonPicture({
  season,
  names,
}: {
  season: RepairSeasonDto;
  names: Readonly<Record<SeasonPart, string>>;
}) {
  const { width, onLayout } = useWidth();
  const { usedS, lostS, totals } = season;
  const long = [...totals].sort((one, other) => other.openSeconds - one.openSeconds).slice(0, 3);
  return (
    <View onLayout={onLayout} style={{ rowGap: 6 }}>
      <ChartFrame
        heading={season.over ? 'From booking to hand-over' : 'From booking until now'}
        note={`Most of the working hours: ${long.map(({ part, openSeconds }) => `${names[part]} ${duration(openSeconds, 'minute')}`).join(', ')}.`}
        picture={
          width === 0 ? null : (
            <View style={{ rowGap: 8 }}>
              <Ribbon season={season} names={names} width={width} />
              <Key totals={totals} names={names} />
            </View>
          )
        }
        table={
          <Table
            label="Where the time of the repair went"
            keepOnPhone
            rows={totals}
            rowKey={({ part }) => part}
            columns={[
              { key: 'part', title: 'Part', share: 1.6, cell: ({ part }) => names[part] },
              { key: 'all', title: 'In all', numeric: true, cell: ({ seconds }) => duration(seconds, 'minute') },
              {
                key: 'open',
                title: 'Working hours',
                numeric: true,
                cell: ({ openSeconds }) => duration(openSeconds, 'minute'),
              },
            ]}
          />
        }
      />
      {usedS + lostS > 0 ? (
        <Txt kind="small" tone="ink2">
          {`Of the waits for its module, in working hours: ${duration(usedS, 'minute')} used, ${duration(lostS, 'minute')} lost.`}
        </Txt>
      ) : null}
    </View>
  );
}

/** What the colours are, and how long each was in all. */
function Key({ totals, names }: Pick<RepairSeasonDto, 'totals'> & { names: Readonly<Record<SeasonPart, string>> }) {
  const { colors } = useTheme();
  return (
    <View style={styles.key} aria-hidden>
      {totals.map(({ part, seconds }) => (
        <View key={part} style={styles.part}>
          <Svg width={12} height={16} viewBox="0 0 12 16" fill="none">
            <Rect x={0} y={15} width={12} height={1} fill={colors.edge} />
            <Rect
              x={0}
              y={15 - looks[part].high * 14}
              width={12}
              height={looks[part].high * 14}
              fill={colors[looks[part].color]}
            />
          </Svg>
          <Txt kind="small">{`${names[part]} ${duration(seconds, 'minute')}`}</Txt>
        </View>
      ))}
    </View>
  );
}

function Ribbon({
  season,
  names,
  width,
}: {
  season: RepairSeasonDto;
  names: Readonly<Record<SeasonPart, string>>;
  width: number;
}) {
  const { colors } = useTheme();
  const from = Date.parse(season.from);
  const all = Math.max(1, Date.parse(season.to) - from);
  const x = (at: string) => ((Date.parse(at) - from) / all) * width;
  return (
    <Svg
      width={width}
      height={HEIGHT}
      viewBox={`0 0 ${width} ${HEIGHT}`}
      fill="none"
      role="img"
      aria-label={season.totals.map(({ part, seconds }) => `${names[part]} ${duration(seconds, 'minute')}`).join(', ')}
    >
      <Rect x={0} y={HEIGHT - 2} width={width} height={2} fill={colors.edge} />
      {season.stretches.map((stretch) => {
        const { high, color } = looks[stretch.part];
        // What took minutes of days would not be seen at all.
        const wide = Math.max(1, x(stretch.to) - x(stretch.from));
        return (
          <Rect
            key={`${stretch.part} ${stretch.from}`}
            x={x(stretch.from)}
            y={HEIGHT - 2 - high * (HEIGHT - 4)}
            width={wide}
            height={high * (HEIGHT - 4)}
            fill={colors[color]}
          />
        );
      })}
    </Svg>
  );
}

const styles = StyleSheet.create({
  key: { flexDirection: 'row', flexWrap: 'wrap', columnGap: 16, rowGap: 4 },
  part: { flexDirection: 'row', alignItems: 'center', columnGap: 6 },
});
