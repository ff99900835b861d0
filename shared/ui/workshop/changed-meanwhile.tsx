import { View } from 'react-native';
import { Button } from '../primitives/button';
import { CallOut } from '../primitives/call-out';
import { Table } from '../primitives/table';
import { Txt } from '../primitives/txt';

/** One value that stands differently at the server than in the form. */
export interface Difference {
  name: string;
  theirs: string;
  mine: string;
}

/** What differs between two sets of the same texts, by the names people see. */
export const differences = (
  names: Readonly<Record<string, string>>,
  theirs: Readonly<Record<string, unknown>>,
  mine: Readonly<Record<string, unknown>>,
): Difference[] =>
  Object.entries(names)
    .map(([key, name]) => ({ name, theirs: words(theirs[key]), mine: words(mine[key]) }))
    .filter((each) => same(each.theirs) !== same(each.mine));

/** '4,20' and '4.2' are the same number. */
const same = (text: string): string => {
  const number = Number(text.replace(',', '.').replace('−', '-'));
  return text.trim() !== '' && Number.isFinite(number) ? String(number) : text.trim();
};

const words = (value: unknown): string =>
  value === true
    ? 'yes'
    : value === false
      ? 'no'
      : value === null || value === undefined || value === ''
        ? '–'
        : String(value);

/** Somebody else saved first. What they saved stands beside what is typed here; nothing typed is lost. */
export function ChangedMeanwhile({
  what,
  differing,
  busy,
  onKeepMine,
  onTakeTheirs,
}: {
  /** 'This module type' */
  what: string;
  differing: readonly Difference[];
  busy: boolean;
  onKeepMine: () => void;
  onTakeTheirs: () => void;
}) {
  return (
    <CallOut tone="amber" announce label="Changed meanwhile">
      <View style={{ rowGap: 10 }}>
        <Txt bold>{`${what} was changed by somebody else meanwhile.`}</Txt>
        {differing.length > 0 ? (
          <Table
            label="What differs"
            keepOnPhone
            rows={differing}
            rowKey={(row) => row.name}
            columns={[
              { key: 'name', title: 'What', cell: (row) => row.name, share: 1.4 },
              { key: 'theirs', title: 'Stands now', cell: (row) => row.theirs },
              { key: 'mine', title: 'Typed here', cell: (row) => row.mine },
            ]}
          />
        ) : (
          <Txt>Both say the same.</Txt>
        )}
        <Button look="line" title="Take what stands now" onPress={onTakeTheirs} />
        <Button look="line" title="Save mine over it" busy={busy} onPress={onKeepMine} />
      </View>
    </CallOut>
  );
}
