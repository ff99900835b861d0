import { useState, type ReactNode } from 'react';
import { View } from 'react-native';
import { matchesAll } from '../format/matching';
import { StatusRegion } from './live-region';
import { SearchBox } from './search-box';
import { Txt } from './txt';

/** More rows than these are looked in, fewer are seen at a glance. */
export const searchAbove = 8;

/** A list with a line to look in it, where it is longer than a glance. */
export function Searched<T>({
  items,
  rows = items.length,
  label,
  one,
  textsOf,
  children,
}: {
  items: readonly T[];
  /** How many rows they are drawn as, where one is drawn as several. */
  rows?: number;
  /** What it looks at: 'Name or chemistry'. */
  label: string;
  /** What a row is: 'module type'. */
  one: string;
  /** The texts of a row that are looked in. */
  textsOf: (item: T) => readonly (string | null)[];
  children: (found: readonly T[]) => ReactNode;
}) {
  const [typed, setTyped] = useState('');
  // A list that has become short is shown whole.
  const looked = rows > searchAbove ? typed.trim() : '';
  const found = looked === '' ? items : items.filter((item) => matchesAll(textsOf(item), looked));
  return (
    <View style={{ rowGap: 8, minWidth: 0 }}>
      {rows > searchAbove ? (
        <View style={{ maxWidth: 400 }}>
          <SearchBox label={label} value={typed} onChange={setTyped} />
        </View>
      ) : null}
      {found.length === 0 && looked !== '' ? <Txt>{`No ${one} matches “${looked}”.`}</Txt> : children(found)}
      {looked === '' ? null : <StatusRegion text={`${found.length} of ${items.length} found`} />}
    </View>
  );
}
