import { useState } from 'react';
import { View } from 'react-native';
import type { WaitGroupDto, WaitStageDto, WaitsDto } from '@/shared/contract/waits';
import { BarChart } from '../charts/bar-chart';
import { ChartFrame } from '../charts/chart-frame';
import { duration, durationTable } from '../format/duration';
import { share } from '../format/quantities';
import { Duration } from '../primitives/num';
import { Table } from '../primitives/table';
import { Txt } from '../primitives/txt';
import { useBreakpoint } from '../theme/use-breakpoint';
import { WaitRibbon } from '../wait-ribbon/wait-ribbon';
import { stageLabelPlaces } from './stage-label-places';
import { againstPlan, fewCharges } from './wait-figures';

function useWidth() {
  const [width, setWidth] = useState(0);
  return {
    width,
    onLayout: ({ nativeEvent }: { nativeEvent: { layout: { width: number } } }) =>
      setWidth(Math.round(nativeEvent.layout.width)),
  };
}

/** Hours waited by week of the workshop's calendar. */
export function WeekChart({ waits, onCsv }: { waits: WaitsDto; onCsv: () => void }) {
  const { width, onLayout } = useWidth();
  const first = waits.weeks[0];
  const last = waits.weeks.at(-1);
  return (
    <View onLayout={onLayout}>
      <ChartFrame
        heading="Hours of waiting, by week"
        onCsv={onCsv}
        picture={
          width === 0 ? null : (
            <BarChart
              width={width}
              bars={waits.weeks.map((week) => ({
                key: week.monday,
                label: width / Math.max(1, waits.weeks.length) > 60 ? `wk ${week.week}` : String(week.week),
                used: week.usedHours,
                lost: week.lostHours,
                present: week === last,
              }))}
              twin={
                first && last
                  ? `From ${Math.round(first.waitHours)} hours in week ${first.week} to ${Math.round(last.waitHours)} in week ${last.week}.`
                  : 'No weeks yet.'
              }
            />
          )
        }
        table={
          <Table
            label="Waits by week"
            rows={waits.weeks}
            rowKey={(week) => week.monday}
            columns={[
              {
                key: 'week',
                title: 'Week',
                phone: 'name',
                cell: (week) => `${week.week}, from ${week.monday}`,
                share: 2,
              },
              { key: 'charges', title: 'Charges', numeric: true, phone: 'detail', cell: (week) => `${week.charges}` },
              {
                key: 'hours',
                title: 'Hours',
                numeric: true,
                phone: 'value',
                cell: (week) => week.waitHours.toFixed(1),
              },
              {
                key: 'median',
                title: 'Half under',
                numeric: true,
                phone: 'none',
                cell: (week) => durationTable(week.medianS, 'minute'),
              },
              {
                key: 'p90',
                title: '9 of 10 under',
                numeric: true,
                phone: 'none',
                cell: (week) => durationTable(week.p90S, 'minute'),
              },
            ]}
          />
        }
      />
    </View>
  );
}

const stageNames: Record<WaitStageDto['stage'], string> = {
  queue: 'Queue',
  charging: 'Charging',
  tapering: 'Tapering',
  resting: 'Resting',
  'check-due': 'Check due',
};
const kinds = { queue: 'queue', charging: 'cc', tapering: 'taper', resting: 'rest', 'check-due': 'check' } as const;

/** Where the middle wait goes, as the ribbon of one charge. */
export function StageRibbon({ stages }: { stages: readonly WaitStageDto[] }) {
  const { width, onLayout } = useWidth();
  const total = stages.reduce((sum, stage) => sum + stage.medianS, 0);
  const begins = stages.map((_, index) => stages.slice(0, index).reduce((sum, stage) => sum + stage.medianS, 0));
  if (total <= 0) return null;
  return (
    <View onLayout={onLayout} style={{ rowGap: 8 }}>
      <View style={{ flexDirection: 'row', justifyContent: 'space-between', columnGap: 12, flexWrap: 'wrap' }}>
        <Txt kind="heading" heading={2}>
          Where the middle wait goes
        </Txt>
        <Txt kind="small" tone="ink2">
          middle value of each stage; they need not add up
        </Txt>
      </View>
      {width === 0 ? null : (
        <WaitRibbon
          segments={stages.map((stage, index) => ({
            kind: kinds[stage.stage],
            fromS: begins[index] ?? 0,
            toS: (begins[index] ?? 0) + stage.medianS,
          }))}
          fromS={0}
          toS={total}
          nowS={total}
          nowMark={false}
          width={width}
          height={64}
          twin={stages.map((stage) => `${stageNames[stage.stage]} ${duration(stage.medianS, 'minute')}`).join(', ')}
        />
      )}
      <StageLabels stages={stages} begins={begins.map((begin) => (begin / total) * width)} width={width} />
    </View>
  );
}

function StageLabels({
  stages,
  begins,
  width,
}: {
  stages: readonly WaitStageDto[];
  begins: readonly number[];
  width: number;
}) {
  const places = stageLabelPlaces(begins, width);
  return (
    <View style={places ? { height: 48 } : { flexDirection: 'row', flexWrap: 'wrap', columnGap: 20, rowGap: 6 }}>
      {stages.map((stage, i) => (
        <View key={stage.stage} style={places ? { position: 'absolute', left: places[i] } : { flexGrow: 1 }}>
          <Txt kind="small" tone="ink2">
            {stageNames[stage.stage]}
          </Txt>
          <Duration seconds={stage.medianS} precision="minute" kind="numS" />
        </View>
      ))}
    </View>
  );
}

/** Waits by module type or by charger. Groups under five charges say so instead of pretending. */
export function GroupTable({
  label,
  first,
  groups,
}: {
  label: string;
  first: string;
  groups: readonly WaitGroupDto[];
}) {
  const few = groups.some((group) => group.charges < fewCharges);
  const phone = useBreakpoint() === 'phone';
  return (
    <View style={{ rowGap: 6 }}>
      {phone ? (
        <Txt kind="heading" heading={3}>
          {label}
        </Txt>
      ) : null}
      <Table
        label={label}
        rows={groups}
        rowKey={(group) => group.key}
        columns={[
          { key: 'name', title: first, phone: 'name', share: 2, cell: (group) => group.name },
          {
            key: 'charges',
            title: 'Charges',
            numeric: true,
            phone: 'detail',
            cell: (group) =>
              `${group.charges}${phone ? (group.charges === 1 ? ' charge' : ' charges') : ''}${group.charges < fewCharges ? ' *' : ''}`,
          },
          { key: 'hours', title: 'Hours', numeric: true, phone: 'none', cell: (group) => group.waitHours.toFixed(1) },
          {
            key: 'median',
            title: 'Half under',
            numeric: true,
            phone: 'value',
            cell: (group) => <Duration seconds={group.medianS} precision="minute" kind="numS" />,
          },
          {
            key: 'p90',
            title: '9 of 10 under',
            numeric: true,
            phone: 'none',
            cell: (group) => <Duration seconds={group.p90S} precision="minute" kind="numS" />,
          },
          {
            key: 'inside',
            title: 'Inside band',
            numeric: true,
            phone: 'none',
            cell: (group) => share(group.insideBand),
          },
          {
            key: 'plan',
            title: 'Against the plan',
            numeric: true,
            phone: 'none',
            cell: (group) => againstPlan(group.againstPlanS),
          },
        ]}
      />
      {few ? (
        <Txt kind="small" tone="ink2">
          * Fewer than 5 charges: the middle value says little.
        </Txt>
      ) : null}
    </View>
  );
}
