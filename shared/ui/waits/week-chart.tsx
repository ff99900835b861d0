import { Pressable, StyleSheet, View } from 'react-native';
import type { WaitsDto, WaitWeekDto } from '@/shared/contract/waits';
import { BarChart, BarKey } from '../charts/bar-chart';
import { layoutBars } from '../charts/bar-layout';
import { ChartFrame } from '../charts/chart-frame';
import { durationTable } from '../format/duration';
import { fixed } from '../format/number';
import { Table } from '../primitives/table';
import { useBreakpoint } from '../theme/use-breakpoint';
import { web } from '../theme/web-props';
import { useWidth } from './use-width';
import { chargesWord, fewWords } from './wait-words';
import { weekBars } from './week-bars';

const HEIGHT = 190;

/** Hours waited within working hours by week, used and lost; a bar or a row opens the charges of its week. */
export function WeekChart({
  weeks,
  today,
  onWeek,
  onCsv,
}: {
  weeks: WaitsDto['weeks'];
  today: string;
  onWeek: (monday: string) => void;
  onCsv?: (() => void) | undefined;
}) {
  const { width, onLayout } = useWidth();
  // Beside heading and links a phone has no room for the key.
  const phone = useBreakpoint() === 'phone';
  return (
    <View onLayout={onLayout}>
      <ChartFrame
        heading="Hours of waiting, by week"
        {...(phone ? { note: 'Solid: used. Hatched: lost.' } : { legend: <BarKey /> })}
        {...(onCsv ? { onCsv } : {})}
        picture={width === 0 ? null : <Bars weeks={weeks} today={today} width={width} onWeek={onWeek} />}
        table={<WeekTable weeks={weeks} onWeek={onWeek} />}
      />
    </View>
  );
}

function Bars({
  weeks,
  today,
  width,
  onWeek,
}: {
  weeks: readonly WaitWeekDto[];
  today: string;
  width: number;
  onWeek: (monday: string) => void;
}) {
  const bars = weekBars(weeks, today, width);
  const byMonday = new Map(weeks.map((week) => [week.monday, week]));
  const pitch = width / Math.max(1, weeks.length);
  return (
    <View>
      <BarChart width={width} height={HEIGHT} bars={bars} twin={twinOf(weeks)} />
      {layoutBars(bars, width, HEIGHT).bars.map(({ bar, centre }) => {
        const week = byMonday.get(bar.key);
        if (!week || week.charges === 0) return null;
        const wide = Math.min(48, pitch);
        return (
          <Pressable
            key={bar.key}
            role="button"
            aria-label={`Open the ${chargesWord(week.charges)} of week ${week.week}: ${Math.round(week.lostHours)} h lost, ${Math.round(week.usedHours)} h used`}
            onPress={() => onWeek(bar.key)}
            {...web({ dataSet: { press: '' } })}
            style={[styles.over, { left: centre - wide / 2, width: wide }]}
          />
        );
      })}
    </View>
  );
}

function twinOf(weeks: readonly WaitWeekDto[]): string {
  const [first, last] = [weeks[0], weeks.at(-1)];
  if (!first || !last) return 'No weeks yet.';
  const of = (week: WaitWeekDto) => `${Math.round(week.lostHours)} h lost and ${Math.round(week.usedHours)} h used`;
  return `Week ${first.week}: ${of(first)}. Week ${last.week}: ${of(last)}.`;
}

const time = (week: WaitWeekDto, seconds: number): string =>
  week.charges === 0 ? '–' : week.few ? 'few' : durationTable(seconds, 'minute');

const WeekTable = ({ weeks, onWeek }: { weeks: readonly WaitWeekDto[]; onWeek: (monday: string) => void }) => (
  <Table
    label={`Waits by week; few: ${fewWords}`}
    rows={weeks}
    rowKey={(week) => week.monday}
    rowLabel={(week) => `Open the charges of week ${week.week}`}
    onOpen={(week) => onWeek(week.monday)}
    columns={[
      { key: 'week', title: 'Week', phone: 'name', share: 2, cell: (week) => `${week.week}, from ${week.monday}` },
      { key: 'charges', title: 'Charges', numeric: true, phone: 'none', cell: (week) => String(week.charges) },
      {
        key: 'detail',
        title: 'Used',
        numeric: true,
        phone: 'none',
        cell: (week) => fixed(week.usedHours, 1),
      },
      { key: 'lost', title: 'Lost', numeric: true, phone: 'value', cell: (week) => fixed(week.lostHours, 1) },
      { key: 'median', title: 'Half under', numeric: true, phone: 'none', cell: (week) => time(week, week.medianS) },
      { key: 'p90', title: '9 of 10 under', numeric: true, phone: 'none', cell: (week) => time(week, week.p90S) },
    ]}
  />
);

const styles = StyleSheet.create({ over: { position: 'absolute', top: 0, height: HEIGHT + 26 } });
