import { View } from 'react-native';
import type { LogPreviewDto } from '@/shared/contract/charge-log';
import { clockWithSeconds } from '../format/clock';
import { useFormats } from '../format/formats';
import { EN_DASH, type LocaleMarks } from '../format/marks';
import { ampsNumber, celsiusNumber, clipVoltsNumber, voltsNumber } from '../format/quantities';
import { CallOut } from '../primitives/call-out';
import { FactList } from '../primitives/fact-list';
import { Table } from '../primitives/table';
import { Txt } from '../primitives/txt';
import { keptSentence, lineNumbers, understoodFacts } from './log-words';

/** What was understood of a file: how much, from when to when, what is left out and why, and the first readings. */
export function LogUnderstood({ preview, now }: { preview: LogPreviewDto; now: number }) {
  const { zone, marks } = useFormats();
  const number = (value: number | null, words: (value: number, marks?: LocaleMarks) => string): string =>
    value === null ? EN_DASH : words(value, marks);
  const kept = keptSentence(preview, marks);
  return (
    <View style={{ rowGap: 12 }}>
      <Txt kind="heading" heading={2}>
        What was understood
      </Txt>
      {preview.problem === null ? null : (
        <CallOut tone="red" label="Why it cannot be taken">
          <Txt>{preview.problem}</Txt>
        </CallOut>
      )}
      <FactList facts={understoodFacts(preview, { zone, now, marks })} tight />
      {kept === null ? null : (
        <Txt kind="small" tone="ink2">
          {kept}
        </Txt>
      )}
      {preview.leftOut.length === 0 ? null : (
        <View role="list" aria-label="Lines that are left out">
          <Txt kind="label">Left out</Txt>
          {preview.leftOut.map((one) => (
            <View key={one.reason} role="listitem">
              <Txt kind="small">{`${one.reason} (${lineNumbers(one)})`}</Txt>
            </View>
          ))}
        </View>
      )}
      {preview.rows.length === 0 ? null : (
        <Table
          label="First readings of the file"
          rows={preview.rows}
          rowKey={(row) => String(row.line)}
          keepOnPhone
          columns={[
            { key: 'at', title: 'Time', cell: (row) => clockWithSeconds(Date.parse(row.at), zone) },
            { key: 'volts', title: 'V', numeric: true, cell: (row) => number(row.terminalVolts, clipVoltsNumber) },
            { key: 'amps', title: 'A', numeric: true, cell: (row) => number(row.amps, ampsNumber) },
            { key: 'celsius', title: '°C', numeric: true, cell: (row) => number(row.celsius, celsiusNumber) },
            ...(preview.rows.some(({ groupVolts }) => groupVolts !== null)
              ? [
                  {
                    key: 'groups',
                    title: 'Groups, V',
                    share: 2,
                    cell: (row: LogPreviewDto['rows'][number]) =>
                      row.groupVolts?.map((volts) => voltsNumber(volts, marks)).join('  ') ?? EN_DASH,
                  },
                ]
              : []),
          ]}
        />
      )}
    </View>
  );
}
