import { View } from 'react-native';
import type { Refusal } from '@/calc/plan-types';
import type { SpareDto } from '@/shared/contract/spare';
import { age, date } from '../format/clock';
import { useFormats } from '../format/formats';
import { clipVolts, clipVoltsNumber } from '../format/quantities';
import { LevelColumn } from '../level-column/level-column';
import { CallOut } from '../primitives/call-out';
import { Num } from '../primitives/num';
import { Txt } from '../primitives/txt';
import { StageTag } from '../stage/stage-tag';
import { makeStyles } from '../theme/make-styles';

/** The refusal speaks of the module itself, not of this target: another spare may do. */
export const isOfTheModule = (refusal: Pick<Refusal, 'code'>): boolean =>
  refusal.code === 'deep-discharged' ||
  refusal.code === 'reversed' ||
  refusal.code === 'condition' ||
  refusal.code === 'quarantined';

/** The numbers rule this charge out. There is no way round it here; the texts say what to do. */
export function PlanRefused({
  spare,
  refusals,
  targetVolts,
  now,
}: {
  spare: SpareDto;
  refusals: readonly Refusal[];
  targetVolts: number;
  now: number;
}) {
  const styles = useStyles();
  const { zone, marks } = useFormats();
  const groups = spare.reading?.groupVolts ?? [];
  const lowest = Math.min(...groups);
  const at = groups.indexOf(lowest);
  const deep = lowest < spare.floorVolts;
  const low = deep ? Math.floor((lowest - 0.15) * 10) / 10 : spare.dischargeLimitVolts;
  const readAt = spare.reading ? Date.parse(spare.reading.at) : null;
  const day = readAt === null ? '' : /day/.test(age(readAt, zone, now)) ? date(readAt, zone, now) : '';
  return (
    <CallOut tone="red" announce label={`${spare.label} is not to be charged`}>
      <View style={styles.head}>
        <StageTag stage="overdue" text="Not to be charged" />
        <Txt kind="label">{spare.label}</Txt>
      </View>
      {groups.length > 0 ? (
        <View style={styles.beside}>
          <LevelColumn
            place="live"
            size={groups.length > 4 ? { h: 150 } : { h: 150, w: 34, gap: 10 }}
            stage="planned"
            groups={groups.map((volts, index) => ({
              volts,
              odd: volts < spare.floorVolts || refusals.some((refusal) => refusal.group === index),
            }))}
            targetVolts={targetVolts}
            scale={{ kind: 'window', lowVolts: low, highVolts: Math.max(spare.chargeLimitVolts, targetVolts) }}
            floorVolts={deep ? spare.floorVolts : null}
            name={spare.label}
            ends
            tab
          />
          <View style={styles.words}>
            <Txt kind="small" tone="ink2">
              {day ? `Lowest group, ${day}` : 'Lowest group'}
            </Txt>
            <Num kind="numL" value={clipVoltsNumber(lowest, marks)} unit="V" />
            <Txt kind="small" tone="ink2">
              {[`G${at + 1}`, spare.reading?.by.name].filter(Boolean).join(', ')}
            </Txt>
            {deep ? (
              <>
                <Txt kind="small" tone="ink2" style={styles.floor}>
                  Floor of this type, dashed
                </Txt>
                <Num kind="numM" value={clipVolts(spare.floorVolts, marks).replace(/\s?V$/, '')} unit="V" />
              </>
            ) : null}
          </View>
        </View>
      ) : null}
      <View style={styles.texts}>
        {refusals.map((refusal) => (
          <Txt key={refusal.text} bold>
            {refusal.text}
          </Txt>
        ))}
        {deep ? <Txt>Copper may have gone into the cells: they can short when they are warm and full.</Txt> : null}
      </View>
    </CallOut>
  );
}

const useStyles = makeStyles(() => ({
  head: { flexDirection: 'row', justifyContent: 'space-between', alignItems: 'center' },
  beside: { flexDirection: 'row', columnGap: 18, alignItems: 'center', marginTop: 10 },
  words: { flex: 1, minWidth: 0 },
  floor: { marginTop: 10 },
  texts: { rowGap: 6, marginTop: 12 },
}));
