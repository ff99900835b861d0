import { View } from 'react-native';
import { Button } from '../primitives/button';
import { CallOut } from '../primitives/call-out';
import { Txt } from '../primitives/txt';
import type { SpareTyped } from './spare-form';
import { conditionWords } from './spare-words';

const names: Readonly<Record<keyof SpareTyped, string>> = {
  label: 'Label',
  moduleTypeId: 'Type',
  shelfPlace: 'Shelf place',
  capacityAh: 'Capacity, Ah',
  healthPercent: 'Health, %',
  capacitySource: 'Known from',
  condition: 'Condition',
  note: 'Note',
};

/** Two people changed the same spare: both states field by field, and the two ways on. Nothing typed is lost. */
export function ChangedMeanwhile({
  typed,
  present,
  typeName,
  onMine,
  onTheirs,
}: {
  typed: SpareTyped;
  present: SpareTyped;
  typeName: (id: string) => string;
  /** Goes on with what is typed, knowing the present state; sending it is the next step. */
  onMine: () => void;
  onTheirs: () => void;
}) {
  const words = (field: keyof SpareTyped, value: string) =>
    value === ''
      ? 'empty'
      : field === 'moduleTypeId'
        ? typeName(value)
        : field === 'condition'
          ? (conditionWords[value as keyof typeof conditionWords] ?? value)
          : value;
  const differing = (Object.keys(names) as (keyof SpareTyped)[]).filter((field) => typed[field] !== present[field]);
  return (
    <CallOut tone="amber" announce label="Changed meanwhile">
      <Txt bold>Somebody has changed this spare meanwhile.</Txt>
      <View style={{ rowGap: 4, marginVertical: 8 }}>
        {differing.length === 0 ? (
          <Txt>It now stands as you typed it.</Txt>
        ) : (
          differing.map((field) => (
            <Txt key={field}>
              {`${names[field]}: now `}
              <Txt bold>{words(field, present[field])}</Txt>
              {`, you typed `}
              <Txt bold>{words(field, typed[field])}</Txt>
            </Txt>
          ))
        )}
      </View>
      <View style={{ rowGap: 8 }}>
        <Button look="line" size="small" title="Go on with what I typed" onPress={onMine} />
        <Button look="line" size="small" title="Take what stands there now" onPress={onTheirs} />
      </View>
    </CallOut>
  );
}
