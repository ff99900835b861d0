import { View } from 'react-native';
import { advisedOutcomeNames, type AdvisedDto } from '@/shared/contract/repair';
import { firstName } from '../charge/card-model';
import { moment } from '../format/clock';
import { useFormats } from '../format/formats';
import { Link } from '../primitives/link';
import { Txt } from '../primitives/txt';

/** What the owner was advised, what became of it, and who agreed to that. */
export function AdvisedPart({
  advised,
  now,
  onAdd,
  onChange,
}: {
  advised: readonly AdvisedDto[];
  now: number;
  /** Null: nothing can be written now. */
  onAdd: (() => void) | null;
  onChange: ((item: AdvisedDto) => void) | null;
}) {
  const { zone, marks } = useFormats();
  const at = (instant: string) => moment(Date.parse(instant), zone, now, marks);
  if (advised.length === 0 && !onAdd) return null;
  return (
    <View style={{ rowGap: 8 }}>
      <Txt kind="heading" heading={2}>
        Advised, and what became of it
      </Txt>
      {advised.length === 0 ? <Txt tone="ink2">Nothing was advised yet.</Txt> : null}
      {advised.map((item) => (
        <View key={item.id}>
          <Txt>{`${item.text}: ${advisedOutcomeNames[item.outcome].toLowerCase()}${item.detail ? `, ${item.detail}` : ''}`}</Txt>
          <Txt kind="small" tone="ink2">
            {[
              item.agreedBy && item.agreedAt ? `agreed by ${item.agreedBy}, ${at(item.agreedAt)}` : null,
              `${firstName(item.by.name)}, ${at(item.at)}`,
            ]
              .filter(Boolean)
              .join(' · ')}
          </Txt>
          {onChange ? (
            <Link kind="small" title="Change it" label={`Change ${item.text}`} onPress={() => onChange(item)} />
          ) : null}
        </View>
      ))}
      {onAdd ? <Link title="Add what is advised" onPress={onAdd} /> : null}
    </View>
  );
}
