import { View } from 'react-native';
import { oddGroups } from '@/calc/pack/odd-groups';
import { useFormats } from '../format/formats';
import { deviationWords, millivolts, volts as voltsText } from '../format/quantities';
import { Txt } from '../primitives/txt';
import { typedVolts } from './typed-pad';

/** How many groups are typed, how far apart they are, and which of them stands out. */
export function SoFar({ typed }: { typed: readonly string[] }) {
  const { marks } = useFormats();
  const known = typed.flatMap((text, group) => {
    const volts = typedVolts(text);
    return volts === null ? [] : [{ group, volts }];
  });
  const found = known.length > 0 ? oddGroups(known.map(({ volts }) => volts)) : null;
  const odd = found?.odd.map((at) => known[at]!) ?? [];
  return (
    <View style={{ rowGap: 4 }} role="status">
      <Txt bold>
        {`${known.length} of ${typed.length}${found ? `, spread so far ${millivolts(found.spreadVolts)}` : ''}`}
      </Txt>
      {odd.slice(0, 3).map(({ group, volts }) => (
        <Txt key={group} kind="label" tone="alarm">
          {`G${group + 1}: ${voltsText(volts, marks)}, ${deviationWords(volts - found!.medianVolts)}`}
        </Txt>
      ))}
    </View>
  );
}
