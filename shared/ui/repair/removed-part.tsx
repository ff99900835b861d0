import { View } from 'react-native';
import { moduleFateNames, type RemovedModuleDto } from '@/shared/contract/repair';
import { firstName } from '../charge/card-model';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { Link } from '../primitives/link';
import { Txt } from '../primitives/txt';

/** What became of the modules that were taken out, and of which one nobody has said it yet. */
export function RemovedPart({
  removed,
  missing,
  now,
  onRecord,
}: {
  removed: readonly RemovedModuleDto[];
  /** Position of a module that came out and of which nothing is recorded; null: none. */
  missing: string | null;
  now: number;
  /** Null: nothing can be recorded now. */
  onRecord: (() => void) | null;
}) {
  const { zone, marks } = useFormats();
  if (removed.length === 0 && missing === null) return null;
  return (
    <View style={{ rowGap: 6 }}>
      <Txt kind="heading" heading={2}>
        Taken out
      </Txt>
      {missing === null ? null : (
        <View style={{ flexDirection: 'row', alignItems: 'center', columnGap: 12 }}>
          <Txt style={{ flex: 1 }}>{`Module ${missing}: nobody has recorded what became of it.`}</Txt>
          {onRecord ? (
            <Link
              title="record it"
              label={`Record what became of module ${missing}`}
              align="right"
              onPress={onRecord}
            />
          ) : null}
        </View>
      )}
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
