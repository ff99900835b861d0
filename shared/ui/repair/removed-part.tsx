import { View } from 'react-native';
import { moduleFateNames, type RemovedModuleDto } from '@/shared/contract/repair';
import { firstName } from '../charge/card-model';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { Txt } from '../primitives/txt';

/** What became of the modules that were taken out. */
export function RemovedPart({ removed, now }: { removed: readonly RemovedModuleDto[]; now: number }) {
  const { zone, marks } = useFormats();
  if (removed.length === 0) return null;
  return (
    <View style={{ rowGap: 6 }}>
      <Txt kind="heading" heading={2}>
        Taken out
      </Txt>
      {removed.map((one) => (
        <View key={one.id}>
          <Txt>{`Module ${one.modulePosition}: ${moduleFateNames[one.fate].toLowerCase()}`}</Txt>
          <Txt kind="small" tone="ink2">
            {[`${firstName(one.by.name)}, ${moment(Date.parse(one.at), zone, now, marks)}`, one.note]
              .filter(Boolean)
              .join(' · ')}
          </Txt>
        </View>
      ))}
    </View>
  );
}
