import { View } from 'react-native';
import { useFormats } from '../format/formats';
import { PressableLink } from '../primitives/pressable-link';
import { Txt } from '../primitives/txt';
import { StageGlyph } from '../stage/stage-glyph';
import { makeStyles } from '../theme/make-styles';
import type { StockItem } from './spare-model';
import { OLD_READING_DAYS, readBeforeWords, ruledOutWords } from './spare-words';

/** Beside the table: what no plan takes and why, and how many readings are old. */
export function SpareSide({
  items,
  now,
  onOpen,
}: {
  items: readonly StockItem[];
  now: number;
  onOpen: (id: string) => void;
}) {
  const styles = useStyles();
  const { marks } = useFormats();
  const out = items.flatMap(({ spare }) => {
    const why = ruledOutWords(spare, marks);
    return why === null ? [] : [{ spare, why }];
  });
  const moved = items.filter(({ spare }) => spare.where !== 'fitted' && readBeforeWords(spare) !== null);
  const old = items.filter(
    ({ spare }) =>
      spare.where === 'shelf' &&
      readBeforeWords(spare) === null &&
      spare.reading !== null &&
      now - Date.parse(spare.reading.at) > OLD_READING_DAYS * 86_400_000,
  ).length;
  return (
    <View style={{ rowGap: 24 }}>
      <View>
        <View style={styles.head}>
          <Txt kind="heading" heading={2}>
            Not to be planned
          </Txt>
          <Txt kind="small" tone="ink2">
            {String(out.length)}
          </Txt>
        </View>
        {out.length === 0 ? (
          <Txt kind="small" tone="ink2">
            None. Every spare here can be planned.
          </Txt>
        ) : (
          out.map(({ spare, why }) => (
            <PressableLink
              key={spare.id}
              href={`/spares/${spare.id}`}
              onGo={() => onOpen(spare.id)}
              label={`${spare.label}: ${why}`}
              style={({ pressed }) => [styles.row, pressed && styles.pressed]}
            >
              <View style={styles.name}>
                <StageGlyph stage="stopped" size={15} />
                <Txt kind="numS">{spare.label}</Txt>
              </View>
              <Txt kind="small" tone="ink2">
                {why}
              </Txt>
            </PressableLink>
          ))
        )}
      </View>
      {moved.length > 0 ? (
        <View style={{ rowGap: 4 }}>
          <Txt kind="heading" heading={2}>
            To be read again
          </Txt>
          <Txt kind="small" tone="ink2">
            {`${moved.map(({ spare }) => spare.label).join(', ')}: moved by a charge since the last reading. No plan takes ${moved.length === 1 ? 'it' : 'them'} before.`}
          </Txt>
        </View>
      ) : null}
      {old > 0 ? (
        <View style={{ rowGap: 4 }}>
          <Txt kind="heading" heading={2}>
            Old readings
          </Txt>
          <Txt kind="small" tone="ink2">
            {old === 1
              ? `1 spare was last read more than ${OLD_READING_DAYS} days ago. Its band is wider.`
              : `${old} spares were last read more than ${OLD_READING_DAYS} days ago. Their bands are wider.`}
          </Txt>
        </View>
      ) : null}
    </View>
  );
}

const useStyles = makeStyles(({ colors }) => ({
  head: { flexDirection: 'row', justifyContent: 'space-between', alignItems: 'baseline', paddingBottom: 6 },
  row: { borderTopWidth: 1, borderTopColor: colors.line, paddingVertical: 8, minHeight: 48 },
  pressed: { backgroundColor: colors.well },
  name: { flexDirection: 'row', alignItems: 'center', columnGap: 9 },
}));
