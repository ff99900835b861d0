import { useState } from 'react';
import { View } from 'react-native';
import { Link } from '@/shared/ui/primitives/link';
import { Select } from '@/shared/ui/primitives/select';
import { Txt } from '@/shared/ui/primitives/txt';
import { makeStyles } from '@/shared/ui/theme/make-styles';
import { useBreakpoint } from '@/shared/ui/theme/use-breakpoint';
import { periods, type Period, type WaitParams } from '@/shared/ui/waits/wait-address';
import { DaysFields } from '@/shared/ui/waits/days-fields';
import { narrowedWords, useFilterChoices, type FilterChoice } from './use-filter-choices';
import type { WaitAddressHeld } from './use-wait-address';

/** Which charges the page is about. Everything chosen stands in the address. */
export function FiltersPart({ address }: { address: WaitAddressHeld }) {
  const styles = useStyles();
  const phone = useBreakpoint() === 'phone';
  const { params, period, query, set, narrowed } = address;
  const choices = useFilterChoices(params);
  const [opened, setOpened] = useState(false);
  const first = phone ? 0 : 2;
  // What is set is never hidden.
  const shown = opened ? choices : choices.filter(({ key }, at) => at < first || params[key] !== undefined);
  const words = narrowedWords(choices, params);
  const clear = Object.fromEntries(choices.map(({ key }) => [key, ''])) as WaitParams;
  return (
    <View style={styles.part}>
      <View style={styles.row}>
        <View style={styles.filter}>
          <Select<Period>
            label="Period"
            size="low"
            value={period}
            options={Object.entries(periods).map(([value, label]) => ({ value: value as Period, label }))}
            onChange={(value) =>
              set(
                value === 'days'
                  ? { weeks: 'days', from: query.from, to: query.to }
                  : { weeks: value, from: '', to: '' },
              )
            }
          />
        </View>
        {shown.map((choice) => (
          <FilterSelect key={choice.key} choice={choice} value={params[choice.key]} onChange={set} />
        ))}
        <View style={styles.more}>
          <Link
            title={opened ? 'Fewer filters' : 'More filters'}
            onPress={() => setOpened(!opened)}
            label={opened ? 'Fewer filters' : 'More filters: charger, technician, way, weekday, stage'}
          />
          {narrowed > 0 ? <Link title="Clear the filters" onPress={() => set(clear)} /> : null}
        </View>
      </View>
      {period === 'days' ? (
        <DaysFields
          from={query.from}
          to={query.to}
          latest={address.today}
          onDays={(from, to) => set({ weeks: 'days', from, to })}
        />
      ) : null}
      {words ? <Txt kind="small" tone="ink2">{`Only ${words}.`}</Txt> : null}
    </View>
  );
}

function FilterSelect({
  choice,
  value,
  onChange,
}: {
  choice: FilterChoice;
  value: string | undefined;
  onChange: (change: WaitParams) => void;
}) {
  const styles = useStyles();
  return (
    <View style={styles.filter}>
      <Select
        label={choice.label}
        size="low"
        value={value ?? ''}
        options={[{ value: '', label: choice.all }, ...choice.options]}
        onChange={(next) => onChange({ [choice.key]: next })}
      />
    </View>
  );
}

const useStyles = makeStyles(() => ({
  part: { rowGap: 10 },
  row: { flexDirection: 'row', flexWrap: 'wrap', columnGap: 12, rowGap: 12, alignItems: 'flex-end' },
  filter: { flexGrow: 1, flexBasis: 150, maxWidth: 300 },
  more: { flexDirection: 'row', columnGap: 20 },
}));
