import { View } from 'react-native';
import type { ChannelDto, ChargerDto, MeterDto } from '@/shared/contract/equipment';
import { useFormats } from '../format/formats';
import { NBSP } from '../format/marks';
import { shortest } from '../format/number';
import { plannedAmps } from '../format/quantities';
import { Link } from '../primitives/link';
import { Table, type Column } from '../primitives/table';
import { Txt } from '../primitives/txt';
import { StageTag } from '../stage/stage-tag';
import { stages, type StageMark } from '../stage/stages';
import { useBreakpoint } from '../theme/use-breakpoint';
import { meterChecked } from './meter-age';

type Row = ChannelDto & { charger: ChargerDto };

const sensesColumn: Column<Row> = {
  key: 'senses',
  width: 78,
  title: 'Senses at',
  phone: 'none',
  cell: (row) => (row.senses === 'module' ? 'the module' : 'terminals'),
};

/** Every channel of the workshop with what it gives, its charger's meter, and who holds it now. */
export function ChargersTable({
  chargers,
  meters,
  now,
  mayChange,
  mayFail,
  mayClear,
  disabled,
  onEdit,
  onFailed,
  onWorks,
}: {
  chargers: readonly ChargerDto[];
  meters: readonly MeterDto[];
  now: number;
  mayChange: boolean;
  /** May say that a channel is out of order; that it works again. */
  mayFail: boolean;
  mayClear: boolean;
  disabled: boolean;
  onEdit: (charger: ChargerDto) => void;
  onFailed: (channel: ChannelDto) => void;
  onWorks: (channel: ChannelDto) => void;
}) {
  const { zone, marks } = useFormats();
  // On the tablet the room goes to who has a channel now.
  const tablet = useBreakpoint() === 'tablet';
  const rows: Row[] = chargers
    .filter((charger) => !charger.retired)
    .flatMap((charger) => charger.channels.map((channel) => ({ ...channel, charger })))
    .sort((a, b) => a.name.localeCompare(b.name));
  const meterOf = (charger: ChargerDto) => meters.find((meter) => meter.id === charger.meterId) ?? null;
  return (
    <Table
      label="Chargers and channels"
      rows={rows}
      rowKey={(row) => row.id}
      columns={[
        { key: 'name', title: 'Channel', phone: 'name', width: 58, cell: (row) => <Txt kind="numS">{row.name}</Txt> },
        {
          key: 'amps',
          title: 'Current',
          numeric: true,
          width: 60,
          phone: 'detail',
          cell: (row) => plannedAmps(row.maxAmps, marks),
        },
        {
          key: 'volts',
          title: 'Up to',
          numeric: true,
          width: 62,
          phone: 'detail',
          cell: (row) => `${shortest(row.maxVolts, 2, marks)}${NBSP}V`,
        },
        {
          key: 'direction',
          width: 94,
          title: 'Direction',
          phone: 'none',
          cell: (row) => (row.canDischarge ? 'up and down' : 'up'),
        },
        ...(tablet ? [] : [sensesColumn]),
        {
          key: 'checked',
          width: 104,
          title: 'Meter checked',
          phone: 'none',
          cell: (row) => meterChecked(meterOf(row.charger), zone, now),
        },
        {
          key: 'now',
          title: 'Now',
          phone: 'detail',
          share: 1,
          cell: (row) => <Now row={row} />,
        },
        ...(mayFail || mayClear
          ? [
              {
                key: 'order',
                title: 'Order',
                quietTitle: true,
                phone: 'detail' as const,
                width: 92,
                cell: (row: Row) =>
                  row.fault === null && mayFail ? (
                    <Link
                      tight
                      kind="small"
                      title="out of order"
                      label={`${row.name} is out of order`}
                      disabled={disabled}
                      onPress={() => onFailed(row)}
                    />
                  ) : row.fault !== null && mayClear ? (
                    <Link
                      tight
                      kind="small"
                      title="works again"
                      label={`${row.name} works again`}
                      disabled={disabled}
                      onPress={() => onWorks(row)}
                    />
                  ) : null,
              },
            ]
          : []),
        ...(mayChange
          ? [
              {
                key: 'edit',
                title: 'Change',
                quietTitle: true,
                phone: 'value' as const,
                width: 48,
                cell: (row: Row) => (
                  <View>
                    <Link
                      tight
                      kind="small"
                      align="right"
                      title="edit"
                      label={`Edit ${row.charger.name} with channel ${row.name}`}
                      onPress={() => onEdit(row.charger)}
                    />
                  </View>
                ),
              },
            ]
          : []),
      ]}
    />
  );
}

/** Who has it now, or what is wrong with it. */
function Now({ row }: { row: Row }) {
  if (row.fault) return <StageTag stage="overdue" text={`out of order: ${row.fault.seen}`} />;
  if (!row.heldBy) return <Txt tone="ink2">free</Txt>;
  const { stage, title } = row.heldBy;
  return stage in stages ? (
    <StageTag stage={stage as StageMark} text={`${stages[stage as StageMark].word}, ${title}`} />
  ) : (
    <Txt>{title}</Txt>
  );
}
