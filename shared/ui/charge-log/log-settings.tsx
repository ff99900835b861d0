import { View } from 'react-native';
import type { LogChoices } from '@/shared/contract/charge-log';
import { elapsedUnits } from '@/shared/contract/charge-log-words';
import { timeOfDayText, parseTimeOfDay } from '../format/parse';
import { dayOf, instantOfDay, localTime } from '../format/zone';
import { useFormats } from '../format/formats';
import { DateTimeField } from '../primitives/date-time-field';
import { Select } from '../primitives/select';
import { makeStyles } from '../theme/make-styles';
import { useState } from 'react';

/** How the file is written, and what its times and volts count from. */
export function LogSettings({
  choices,
  startedAt,
  now,
  onChange,
}: {
  choices: LogChoices;
  /** Start of the charge, epoch ms. */
  startedAt: number;
  now: number;
  onChange: (choices: LogChoices) => void;
}) {
  const styles = useStyles();
  const time = choices.columns.find(({ use }) => use === 'time');
  const elapsed = time !== undefined && elapsedUnits.includes(time.unit);
  const lines = Math.max(12, choices.headerLine);
  return (
    <View style={styles.row}>
      <View style={styles.part}>
        <Select
          size="low"
          label="Columns are parted by"
          value={choices.separator === '\t' ? 'tab' : choices.separator}
          options={[
            { value: ',', label: 'a comma' },
            { value: ';', label: 'a semicolon' },
            { value: 'tab', label: 'a tab' },
          ]}
          // Other columns: what they hold is guessed anew.
          onChange={(next) =>
            onChange({ ...choices, separator: next === 'tab' ? '\t' : (next as ',' | ';'), columns: [] })
          }
        />
      </View>
      <View style={styles.part}>
        <Select
          size="low"
          label="Decimals stand after"
          value={choices.decimal}
          options={[
            { value: '.', label: 'a point: 11.64' },
            { value: ',', label: 'a comma: 11,64' },
          ]}
          onChange={(decimal) => onChange({ ...choices, decimal })}
        />
      </View>
      <View style={styles.part}>
        <Select
          size="low"
          label="Names of the columns"
          value={String(choices.headerLine)}
          options={[
            { value: '0', label: 'There are none' },
            ...Array.from({ length: lines }, (_, at) => ({ value: String(at + 1), label: `In line ${at + 1}` })),
          ]}
          onChange={(line) => onChange({ ...choices, headerLine: Number(line) })}
        />
      </View>
      {choices.columns.some(({ use }) => use === 'volts') ? (
        <View style={styles.part}>
          <Select
            size="low"
            label="Volts were read"
            value={choices.takenAt ?? 'unknown'}
            options={[
              { value: 'unknown', label: 'Not known where' },
              { value: 'supply', label: 'At the charger’s terminals' },
              { value: 'module', label: 'At the module' },
            ]}
            onChange={(next) => onChange({ ...choices, takenAt: next === 'unknown' ? null : next })}
          />
        </View>
      ) : null}
      {elapsed ? (
        <View style={styles.part}>
          <Select
            size="low"
            label="Its times count from"
            value={choices.zeroAt === null ? 'start' : 'other'}
            options={[
              { value: 'start', label: 'The start of the charge' },
              { value: 'other', label: 'Another time' },
            ]}
            onChange={(next) =>
              onChange({ ...choices, zeroAt: next === 'start' ? null : new Date(startedAt).toISOString() })
            }
          />
        </View>
      ) : null}
      {elapsed && choices.zeroAt !== null ? (
        <ZeroAt
          zeroAt={Date.parse(choices.zeroAt)}
          now={now}
          onChange={(at) => onChange({ ...choices, zeroAt: new Date(at).toISOString() })}
        />
      ) : null}
    </View>
  );
}

function ZeroAt({ zeroAt, now, onChange }: { zeroAt: number; now: number; onChange: (at: number) => void }) {
  const { zone } = useFormats();
  const { hour, minute } = localTime(zeroAt, zone);
  const [typed, setTyped] = useState({ day: dayOf(zeroAt, zone), time: timeOfDayText(hour * 60 + minute) });
  const minutes = parseTimeOfDay(typed.time);
  return (
    <DateTimeField
      label="Its zero was at"
      value={typed}
      onChange={setTyped}
      onBlur={() => {
        if (minutes !== null) onChange(instantOfDay(typed.day, minutes, zone));
      }}
      today={dayOf(now, zone)}
      from={-14}
      to={0}
      error={minutes === null ? 'This is no time. Type it like 14:05.' : undefined}
    />
  );
}

const useStyles = makeStyles(() => ({
  row: { flexDirection: 'row', flexWrap: 'wrap', columnGap: 12, rowGap: 10 },
  part: { flexGrow: 1, flexBasis: 180, minWidth: 0 },
}));
