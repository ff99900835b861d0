import { View } from 'react-native';
import { age } from '../format/clock';
import { useFormats } from '../format/formats';
import { celsius, clipVolts, clipVoltsNumber, millivolts, volts, voltsNumber } from '../format/quantities';
import { columnGroups, columnScale } from '../charge/card-drawings';
import { stageOf } from '../charge/card-model';
import { LevelColumn } from '../level-column/level-column';
import { Num } from '../primitives/num';
import { Txt } from '../primitives/txt';
import { makeStyles } from '../theme/make-styles';
import { presentVolts, readAt, type StockItem } from './spare-model';
import { apartVolts, OLD_READING_DAYS, readBeforeWords } from './spare-words';

/** The groups as vessels, and beside them the lowest, how far apart they are, and how old that is. */
export function SpareHead({ item, now }: { item: StockItem; now: number }) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const { spare, card } = item;
  const groups = presentVolts(item);
  const under = card !== null && card.stage !== 'planned' && card.stage !== 'queued';
  const lowest = groups.length > 0 ? Math.min(...groups) : null;
  const at = readAt(item);
  const days = at === null ? 0 : (now - at) / 86_400_000;
  const deep = lowest !== null && lowest < spare.floorVolts;
  const ageText = at === null ? null : age(at, zone, now);
  const before = readBeforeWords(spare);
  const mark = card
    ? `Mark: ${volts(card.targetVolts, marks)}, target of ${card.title}`
    : spare.shelfVolts !== null
      ? `Mark: ${clipVolts(spare.shelfVolts, marks)}, the shelf voltage`
      : `Mark: ${clipVolts(spare.chargeLimitVolts, marks)}, the charge limit`;
  if (lowest === null) return <Txt tone="ink2">It has not been read yet. Enter a reading, then it can be planned.</Txt>;
  const many = groups.length > 4;
  return (
    <View style={styles.beside}>
      <LevelColumn
        place="live"
        size={many ? { h: 150 } : { h: 150, w: 40, gap: 12 }}
        stage={under ? stageOf(card) : 'planned'}
        groups={
          under
            ? columnGroups(card).map((group) => ({
                ...group,
                text: many ? undefined : voltsNumber(group.volts, marks),
              }))
            : groups.map((value) => ({
                volts: value,
                odd: value < spare.floorVolts,
                text: many ? undefined : deep ? clipVoltsNumber(value, marks) : voltsNumber(value, marks),
              }))
        }
        targetVolts={card?.targetVolts ?? spare.shelfVolts ?? spare.chargeLimitVolts}
        scale={
          under
            ? columnScale(card, 'live')
            : {
                kind: 'window',
                lowVolts: deep ? Math.floor((lowest - 0.15) * 10) / 10 : spare.dischargeLimitVolts,
                highVolts: spare.chargeLimitVolts,
              }
        }
        floorVolts={deep ? spare.floorVolts : null}
        reckoned={under && card.groups.some((group) => group.reckoned)}
        name={spare.label}
        labels
        ends
        tab
      />
      <View style={styles.words}>
        <Txt kind="small" tone="ink2">
          {under ? 'Lowest group, reckoned' : 'Lowest group'}
        </Txt>
        <Num
          kind="numL"
          unit="V"
          tone={deep ? 'alarm' : 'ink'}
          value={deep ? clipVoltsNumber(lowest, marks) : voltsNumber(lowest, marks)}
        />
        <Txt kind="small" tone="ink2">
          {`${millivolts(apartVolts(groups))} apart${!under && spare.reading?.celsius != null ? `, at ${celsius(spare.reading.celsius)}` : ''}`}
        </Txt>
        {deep ? <Txt kind="small" tone="ink2">{`Floor, dashed: ${clipVolts(spare.floorVolts, marks)}`}</Txt> : null}
        {before !== null ? (
          <Txt kind="small" style={styles.age}>
            <Txt kind="small" bold>
              {`${before}.`}
            </Txt>
            {' Its groups have moved since: read it again before it is planned.'}
          </Txt>
        ) : ageText ? (
          <Txt kind="small" style={styles.age}>
            <Txt kind="small" bold>
              {ageText === 'today' ? 'Read today.' : ageText === 'yesterday' ? 'Read yesterday.' : `${ageText} old.`}
            </Txt>
            {!under && days > OLD_READING_DAYS
              ? ' Its band would be wide: read it again before it is planned.'
              : !under && days >= 7
                ? ' Read again before it is planned tightly.'
                : ''}
          </Txt>
        ) : null}
        <Txt kind="small" tone="ink2">
          {mark}
        </Txt>
      </View>
    </View>
  );
}

const useStyles = makeStyles(() => ({
  beside: { flexDirection: 'row', columnGap: 20, alignItems: 'center' },
  words: { flex: 1, minWidth: 0, rowGap: 2 },
  age: { marginTop: 8, marginBottom: 4 },
}));
