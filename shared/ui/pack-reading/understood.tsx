import { View } from 'react-native';
import { oddGroups } from '@/calc/pack/odd-groups';
import { useFormats } from '../format/formats';
import { millivolts, volts as voltsText } from '../format/quantities';
import { PackPicture } from '../pack-picture/pack-picture';
import { CallOut } from '../primitives/call-out';
import { FactList } from '../primitives/fact-list';
import { Rule } from '../primitives/rule';
import { Select } from '../primitives/select';
import { Table } from '../primitives/table';
import { Span, Txt } from '../primitives/txt';
import { separators, type ReadingText, type Separator, type VoltsUnit } from './reading-text';
import { lineWords, separatorNames, understoodSentence } from './understood-words';

/** The picture of whole readings with spread, median and what is odd. */
export function ReadingPicture({ volts, positions }: { volts: readonly number[]; positions: readonly string[] }) {
  const { marks } = useFormats();
  const { odd, medianVolts, spreadVolts } = oddGroups(volts);
  return (
    <View style={{ rowGap: 12 }}>
      <FactList
        facts={[
          { name: 'Spread', value: millivolts(spreadVolts) },
          { name: `Median of ${volts.length}`, value: voltsText(medianVolts, marks) },
          { name: 'Odd', value: odd.length === 1 ? '1 group' : `${odd.length} groups` },
        ]}
      />
      <PackPicture groupVolts={volts} medianVolts={medianVolts} odd={odd} positions={positions} height={132} />
    </View>
  );
}

/** What a table was read as, beside its first lines; what was not understood is named by its line. */
export function Understood({
  read,
  positions,
  onSeparator,
  onUnit,
}: {
  read: ReadingText;
  positions: readonly string[];
  onSeparator: (separator: Separator) => void;
  onUnit: (unit: VoltsUnit) => void;
}) {
  const { marks } = useFormats();
  const { groupVolts, problems, ignored, refusal } = read;
  return (
    <View style={{ rowGap: 14 }}>
      {refusal ? (
        <CallOut tone="red" label="Not understood" announce>
          <Txt>{refusal}</Txt>
        </CallOut>
      ) : (
        <Txt kind="title" heading={2} role="status">
          {understoodSentence(read)}
        </Txt>
      )}
      {problems.slice(0, 8).map(({ line, text }) => (
        <Txt key={`${line} ${text}`} tone="alarm">
          <Span bold>{`Line ${line}: `}</Span>
          {text}
        </Txt>
      ))}
      {problems.length > 8 ? <Txt tone="alarm">{`and ${problems.length - 8} lines more`}</Txt> : null}
      {read.lines.length > 0 ? (
        <Table
          label="First lines and what they were read as"
          keepOnPhone
          rows={read.lines}
          rowKey={(line) => String(line.line)}
          columns={[
            { key: 'text', title: 'In the file', share: 1.2, tone: 'ink2', cell: (line) => line.text.slice(0, 60) },
            { key: 'as', title: 'Read as', share: 1.2, cell: (line) => lineWords(line, positions) },
            {
              key: 'volts',
              title: 'Volts',
              numeric: true,
              cell: (line) => (line.groups?.length === 1 ? voltsText(groupVolts[line.groups[0]!]!, marks) : ''),
            },
          ]}
        />
      ) : null}
      {ignored.length > 0 ? (
        <Txt kind="small" tone="ink2">{`Not used: ${ignored.slice(0, 8).join(', ')}${
          ignored.length > 8 ? ` and ${ignored.length - 8} more` : ''
        }.`}</Txt>
      ) : null}
      {refusal ? null : <ReadingPicture volts={groupVolts} positions={positions} />}
      <Rule />
      <Select
        label="Separated by"
        value={read.separator}
        options={separators.map((value) => ({ value, label: separatorNames[value] }))}
        onChange={onSeparator}
      />
      <Select
        label="Unit"
        value={read.unit}
        options={[
          { value: 'V', label: 'V' },
          { value: 'mV', label: 'mV' },
        ]}
        onChange={onUnit}
      />
    </View>
  );
}
