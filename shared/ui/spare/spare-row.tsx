import { View } from 'react-native';
import { age } from '../format/clock';
import { useFormats } from '../format/formats';
import { clipVolts, millivolts, volts } from '../format/quantities';
import { PressableLink } from '../primitives/pressable-link';
import { Txt } from '../primitives/txt';
import { StageGlyph } from '../stage/stage-glyph';
import { makeStyles } from '../theme/make-styles';
import { SpareColumn } from './spare-column';
import { presentVolts, readAt, stockMark, whereWords, type StockItem } from './spare-model';
import { apartVolts, capacityWords, readBeforeWords, ruledOutWords } from './spare-words';

/** One spare on the phone: columns, label, where it is, capacity with its source; lowest volts and their age. */
export function SpareRow({ item, now, onOpen }: { item: StockItem; now: number; onOpen: () => void }) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const { spare } = item;
  const groups = presentVolts(item);
  const lowest = groups.length > 0 ? Math.min(...groups) : null;
  const mark = stockMark(item);
  const at = readAt(item);
  const under = lowest !== null && lowest < spare.floorVolts;
  const out = ruledOutWords(spare, marks);
  const before = readBeforeWords(spare);
  const where = whereWords(item);
  const detail = [
    out ?? `${capacityWords(spare, marks)}, ${millivolts(apartVolts(groups))} apart`,
    ...(before === null ? [] : [before.replace(/^R/, 'r')]),
  ].join(', ');
  const lowestWords = lowest === null ? 'not read' : under ? clipVolts(lowest, marks) : volts(lowest, marks);
  const ageWords = before !== null ? 'read again' : at === null ? '' : age(at, zone, now);
  return (
    <PressableLink
      href={`/spares/${spare.id}`}
      onGo={onOpen}
      label={[spare.label, where, detail, `lowest group ${lowestWords}`, ageWords].filter(Boolean).join(', ')}
      style={({ pressed }) => [styles.row, pressed && styles.pressed]}
    >
      <View style={styles.column}>
        <SpareColumn item={item} />
      </View>
      <View style={styles.words}>
        <View style={styles.name}>
          <Txt kind="numS" nowrap>
            {spare.label}
          </Txt>
          {mark ? <StageGlyph stage={mark} size={17} tone={mark === 'stopped' ? 'stopped' : 'ink'} /> : null}
          <Txt kind="small" bold={spare.where === 'quarantine'} numberOfLines={1} style={styles.where}>
            {where}
          </Txt>
        </View>
        <Txt kind="small" tone="ink2" numberOfLines={2}>
          {detail}
        </Txt>
      </View>
      <View style={styles.volts}>
        <Txt
          kind="numS"
          nowrap
          align="right"
          tone={lowest === null ? 'ink2' : under ? 'alarm' : before !== null ? 'ink3' : 'ink'}
        >
          {lowestWords}
        </Txt>
        <Txt kind="small" tone="ink2" nowrap align="right">
          {ageWords}
        </Txt>
      </View>
    </PressableLink>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  row: {
    flexDirection: 'row',
    alignItems: 'center',
    columnGap: 12,
    minHeight: 70,
    paddingVertical: 6,
    borderTopWidth: 1,
    borderTopColor: colors.line,
  },
  pressed: { backgroundColor: colors.well },
  column: { width: 76, alignItems: 'flex-start', flexShrink: 0 },
  words: { flex: 1, minWidth: 0 },
  name: { flexDirection: 'row', alignItems: 'center', columnGap: 8 },
  where: { flexShrink: 1 },
  volts: { alignItems: 'flex-end', flexShrink: 0 },
}));
