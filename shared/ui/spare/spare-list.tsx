import { View } from 'react-native';
import { useFormats } from '../format/formats';
import { clipVolts } from '../format/quantities';
import { Txt } from '../primitives/txt';
import type { StockItem } from './spare-model';
import { SpareRow } from './spare-row';

/** The stock by type, on phone and tablet. */
export function SpareList({
  items,
  now,
  onOpen,
}: {
  items: readonly StockItem[];
  now: number;
  onOpen: (id: string) => void;
}) {
  const { marks } = useFormats();
  const types = [...new Set(items.map(({ spare }) => spare.moduleTypeId))];
  return (
    <View style={{ rowGap: 14 }}>
      {types.map((typeId, index) => {
        const own = items.filter(({ spare }) => spare.moduleTypeId === typeId);
        const first = own[0]?.spare;
        if (!first) return null;
        const count = `${own.length} ${own.length === 1 ? 'module' : 'modules'}`;
        return (
          <View key={typeId}>
            <View
              style={{
                flexDirection: 'row',
                alignItems: 'baseline',
                justifyContent: 'space-between',
                columnGap: 12,
                paddingBottom: 4,
              }}
            >
              <Txt kind="heading" heading={2} numberOfLines={1} style={{ flexShrink: 1 }}>
                {first.typeName}
              </Txt>
              <Txt kind="small" tone="ink2" nowrap>
                {index === 0 && first.shelfVolts !== null
                  ? `mark: shelf ${clipVolts(first.shelfVolts, marks)}, or target`
                  : count}
              </Txt>
            </View>
            <View role="list" aria-label={first.typeName}>
              {own.map((item) => (
                <View role="listitem" key={item.spare.id}>
                  <SpareRow item={item} now={now} onOpen={() => onOpen(item.spare.id)} />
                </View>
              ))}
            </View>
          </View>
        );
      })}
    </View>
  );
}
