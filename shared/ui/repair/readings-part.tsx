import { View } from 'react-native';
import { readingName, type PackReadingDto } from '@/shared/contract/pack-reading';
import type { RepairDto } from '@/shared/contract/repair';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { ampHours, bandBeside, millivolts, millivoltsWithBand } from '../format/quantities';
import { Link } from '../primitives/link';
import { Table } from '../primitives/table';
import { Txt } from '../primitives/txt';

const changeWords: Record<NonNullable<PackReadingDto['change']>['kind'], string> = {
  exchange: 'the exchange',
  'no-change': 'no change',
  balanced: 'balanced',
  worse: 'worse',
};

/** What a reading is against the one before it: 'balanced 1.4 Ah (0.8–2.2)'. */
export function changeText({ change }: PackReadingDto, marks: Parameters<typeof ampHours>[1]): string {
  if (!change) return '';
  const { ampHours: moved } = change;
  if (!moved) return changeWords[change.kind];
  const plain = (value: number) => ampHours(value, marks).replace(/\s?Ah$/, '');
  return `${changeWords[change.kind]} ${ampHours(moved.likely, marks)} (${plain(moved.low)}–${plain(moved.high)})`;
}

/** All readings of the pack over time, in mV and in Ah: mV at different states of charge do not compare. */
export function ReadingsPart({
  repair,
  shown,
  now,
  onShow,
  onSetAside,
}: {
  repair: RepairDto;
  /** The reading that stands in the picture. */
  shown: string | null;
  now: number;
  onShow: (id: string) => void;
  /** Null: readings cannot be set aside now. */
  onSetAside: ((reading: PackReadingDto) => void) | null;
}) {
  const { zone, marks } = useFormats();
  const rows = [...repair.readings].sort((a, b) => a.at.localeCompare(b.at));
  const expected = repair.expectedAfterFit;
  const { forecast } = repair;
  const present = rows.find(({ id }) => id === shown);
  if (rows.length === 0) return null;
  return (
    <View style={{ rowGap: 4 }}>
      <Txt kind="heading" heading={2}>
        Readings of the pack
      </Txt>
      <Table
        label="Readings of the pack"
        rows={rows}
        rowKey={({ id }) => id}
        onOpen={rows.length > 1 ? ({ id }) => onShow(id) : undefined}
        rowLabel={(row) => `Show the reading ${readingName(row)}, ${moment(Date.parse(row.at), zone, now, marks)}`}
        rowTone={({ id }) => (id === shown && rows.length > 1 ? 'sheet' : null)}
        keepOnPhone
        columns={[
          {
            key: 'stage',
            title: 'Stage',
            share: 2,
            cell: (row) => (
              <View>
                <Txt bold={row.id === shown} style={row.setAside ? { textDecorationLine: 'line-through' } : undefined}>
                  {readingName(row)}
                </Txt>
                <Txt kind="small" tone="ink2">
                  {[moment(Date.parse(row.at), zone, now, marks), row.setAside ? 'set aside' : changeText(row, marks)]
                    .filter(Boolean)
                    .join(' · ')}
                </Txt>
              </View>
            ),
          },
          { key: 'mv', title: 'Spread', numeric: true, cell: (row) => millivolts(row.spreadMillivolts / 1000) },
          {
            key: 'ah',
            title: 'Ah',
            numeric: true,
            cell: (row) => (row.spreadAmpHours === null ? '–' : ampHours(row.spreadAmpHours, marks)),
          },
        ]}
      />
      {onSetAside && present && !present.setAside ? (
        <Link
          kind="small"
          title="Set this reading aside"
          label={`Set the reading ${readingName(present)} aside`}
          onPress={() => onSetAside(present)}
        />
      ) : null}
      {expected ? (
        <Txt kind="small" tone="ink2">
          {`Expected after the fit: ${millivoltsWithBand({ p10: expected.low / 1000, p50: expected.likely / 1000, p90: expected.high / 1000 })}${forecast?.charges ? `, then ${balanceWords(forecast.charges)}` : ''}.`}
        </Txt>
      ) : null}
    </View>
  );
}

/** '1 balance charge (1–2)', '1 balance charge' */
export function balanceWords({ p10, p50, p90 }: NonNullable<NonNullable<RepairDto['forecast']>['charges']>): string {
  const likely = Math.round(p50);
  return `${likely} balance ${likely === 1 ? 'charge' : 'charges'}${bandBeside(p50, p10, p90)}`;
}
