import type { StatusDto } from '@/shared/contract/status';
import { age, moment } from '../format/clock';
import { duration } from '../format/duration';
import { useFormats } from '../format/formats';
import { NBSP, type LocaleMarks } from '../format/marks';
import { shortest } from '../format/number';
import { FactList } from '../primitives/fact-list';
import { Table } from '../primitives/table';
import { Txt } from '../primitives/txt';

/** '12.4 MiB' */
export function fileSize(bytes: number, marks: LocaleMarks): string {
  const units = ['B', 'KiB', 'MiB', 'GiB', 'TiB'];
  const step = bytes < 1 ? 0 : Math.min(units.length - 1, Math.floor(Math.log2(bytes) / 10));
  const value = bytes / 1024 ** step;
  return `${shortest(value, value < 100 && step > 0 ? 1 : 0, marks)}${NBSP}${units[step] ?? 'B'}`;
}

/** 'every hour', 'every 6 h' */
function everyWords(hours: number, marks: LocaleMarks): string {
  if (hours === 0) return 'never';
  return hours === 1 ? 'every hour' : `every ${shortest(hours, 2, marks)}${NBSP}h`;
}

/** Copies that are this many intervals old are a sign that none is made any more. */
const OLD_INTERVALS = 3;

/** What is wrong with the copies; null: nothing. */
export function copiesWarning({ backups, at }: StatusDto): string | null {
  const [newest] = backups.latest;
  if (backups.failed) return `The last copy could not be made: ${backups.failed.reason}`;
  if (backups.everyHours === 0)
    return newest ? null : 'No copy of the data was made yet, and none is made by the clock.';
  if (!newest) return 'No copy of the data was made yet.';
  const hours = (Date.parse(at) - Date.parse(newest.at)) / 3600_000;
  return hours > OLD_INTERVALS * backups.everyHours
    ? 'The newest copy is older than it should be. Tell whoever runs the server.'
    : null;
}

/** How the installation is, in facts. */
export function StatusFacts({ status, now }: { status: StatusDto; now: number }) {
  const { zone, marks } = useFormats();
  const { backups } = status;
  const [newest] = backups.latest;
  return (
    <FactList
      facts={[
        { name: 'Version', value: status.version },
        {
          name: 'Up since',
          value: moment(Date.parse(status.startedAt), zone, now, marks),
          note: duration((now - Date.parse(status.startedAt)) / 1000),
        },
        { name: 'Database', value: fileSize(status.databaseBytes, marks) },
        {
          name: 'Room left on its disk',
          value: status.freeBytes === null ? 'not known' : fileSize(status.freeBytes, marks),
        },
        { name: 'Screens connected', value: String(status.sockets) },
        ...(status.overdueLooks > 0
          ? [{ name: 'Charges that wait for the server', value: String(status.overdueLooks) }]
          : []),
        { name: 'Alerts on their way out', value: String(status.outbox.waiting) },
        {
          name: 'Alerts that could not be brought',
          value: String(status.outbox.dead),
        },
        {
          name: 'Newest copy of the data',
          value: newest ? moment(Date.parse(newest.at), zone, now, marks) : 'none yet',
        },
        {
          name: 'Copies in all',
          value: String(backups.count),
          note: fileSize(backups.bytes, marks),
        },
        {
          name: 'Made by the clock',
          value: everyWords(backups.everyHours, marks),
        },
      ]}
    />
  );
}

/** The last copies, newest first. */
export function CopiesTable({ status, now }: { status: StatusDto; now: number }) {
  const { zone, marks } = useFormats();
  if (status.backups.latest.length === 0) return <Txt tone="ink2">No copies yet.</Txt>;
  return (
    <Table
      label="Copies of the data"
      rows={status.backups.latest}
      rowKey={(copy) => copy.name}
      columns={[
        {
          key: 'at',
          title: 'Made',
          phone: 'name',
          share: 1.4,
          cell: (copy) => moment(Date.parse(copy.at), zone, now, marks),
        },
        { key: 'age', title: 'Age', phone: 'detail', cell: (copy) => age(Date.parse(copy.at), zone, now) },
        { key: 'size', title: 'Size', numeric: true, phone: 'detail', cell: (copy) => fileSize(copy.bytes, marks) },
        {
          key: 'by',
          title: 'Made by',
          phone: 'detail',
          cell: (copy) => (copy.byClock ? 'the clock' : 'hand or migration'),
        },
      ]}
    />
  );
}
